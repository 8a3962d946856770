import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { Finding } from "@/lib/findings/finding";
import { passVerdict, type PassVerdict } from "@/lib/findings/pass-verdict";
import { sayFinding } from "@/lib/findings/say-finding";
import type { MachineLog } from "@/lib/logs/machine-log";
import type { Seeder } from "@/lib/machines/machine";
import { VerdictBody } from "@/lib/schemas/logs";
import { LARKSPUR } from "@/lib/simulator/scenario/larkspur";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { SIMULATION_DEFAULTS, type SimulationInput } from "@/lib/simulator/simulation-options";

function judge(log: MachineLog, machine: Seeder | null): PassVerdict {
  const built = buildLog(log, machine);
  if (!built.ok) throw new Error(built.error.message);
  return passVerdict(built.value.placed);
}

function judgeSimulated(input: SimulationInput): PassVerdict {
  const { log, truth } = simulateSeedingLog(input);
  return judge(log, truth.options.machine);
}

const BANDS = {
  headingDeg: 25,
  periodM: 6.096,
  widthM: 2.5,
  sideShiftM: 0.3,
  contrastN: 240,
  through: SIMULATION_DEFAULTS.origin,
};
const FIELD: SimulationInput = {
  shape: { kind: "block", passes: 6, passLengthM: 120 },
  soil: { gradientEastNPerM: 0.3, gradientNorthNPerM: -0.5, noiseN: 55, noiseRangeM: 30 },
  noise: { downforceN: 18, marginN: 45, depthM: 0.0025, headingDeg: 0.2, positionM: 0.01 },
  channels: ["downforce", "margin"],
};

describe("a worn row", () => {
  it("is named, and no other, on 50 seeds with residue bands, soil and wheel tracks", () => {
    for (let seed = 1; seed <= 50; seed++) {
      const row = 1 + ((seed * 7) % 24);
      const verdict = judgeSimulated({
        ...FIELD,
        seed,
        bands: BANDS,
        wheelTracks: { rows: [6, 7, 18, 19], effectN: 60 },
        wornRow: { row, extraForceN: 160, marginLossN: 120 },
      });
      expect({ seed, rows: verdict.rowsStandingOut }).toEqual({ seed, rows: [row] });
    }
  }, 240_000);
});

describe("a sound machine", () => {
  it("gets no row named on at least 95 % of 200 seeds", () => {
    let invented = 0;
    for (let seed = 1; seed <= 200; seed++) {
      const verdict = judgeSimulated({
        ...FIELD,
        seed,
        shape: { kind: "block", passes: 4, passLengthM: 80 },
        bands: BANDS,
      });
      if (verdict.findings.some((one) => one.kind === "row-stands-out" || one.kind === "rows-side-by-side")) invented++;
    }
    expect(invented).toBeLessThanOrEqual(10);
  }, 240_000);
});

describe("a field drilled along its residue bands", () => {
  it("gets neither a row nor a wheel track blamed for the band, on 20 seeds", () => {
    const along = { ...BANDS, headingDeg: 0, periodM: 6 };
    for (let seed = 1; seed <= 20; seed++) {
      const verdict = judgeSimulated({ ...FIELD, seed, bands: along });
      const blaming = verdict.findings.filter((one) => one.kind === "row-stands-out" || one.kind === "wheel-tracks");
      expect({ seed, blaming: blaming.map((one) => one.sentence) }).toEqual({ seed, blaming: [] });
    }
  }, 240_000);
});

/** What a verdict says, without the digits that a tenth of the readings would move. */
function claims(verdict: PassVerdict) {
  const { rowsUnderTarget, rowsAtLimit, rowsStandingOut } = verdict;
  const said = verdict.findings.map((one) => `${one.id} ${one.severity}`).sort();
  return { rowsUnderTarget, rowsAtLimit, rowsStandingOut, state: verdict.weight.state, said };
}

const WORN: SimulationInput = {
  ...FIELD,
  seed: 4,
  shape: { kind: "block", passes: 10, passLengthM: 200 },
  machine: {
    ...SIMULATION_DEFAULTS.machine,
    frame: {
      massKg: 3000,
      behindHitchM: 4,
      wheelsBehindHitchM: 4.5,
      rowsBehindHitchM: 5.2,
      ballast: [{ massKg: 600, behindHitchM: 4.8 }],
      minWheelLoadN: 1500,
    },
  },
  wornRow: { row: 17, extraForceN: 150, marginLossN: 180 },
};

describe("the verdict holds still", () => {
  it("when a tenth of the records is lost at random", () => {
    const { log, truth } = simulateSeedingLog(WORN);
    const whole = claims(judge(log, truth.options.machine));
    expect(whole.rowsStandingOut).toEqual([17]);
    expect(whole.rowsUnderTarget).toEqual([17]);
    for (let seed = 1; seed <= 5; seed++) {
      const random = createSeededRandom(seed, "lost records");
      const kept = Array.from({ length: log.records }, (_, i) => i).filter(() => random.uniform() >= 0.1);
      expect(claims(judge(keepRecords(log, kept), truth.options.machine))).toEqual(whole);
    }
  });

  it("when the file was in pounds-force instead of newtons", () => {
    const { log, truth } = simulateSeedingLog(WORN);
    // NIST SP 811: 1 lbf = 4.4482216152605 N. The file's numbers are single precision.
    const lbf = 4.4482216152605;
    const channels = log.channels.map((channel) => ({
      ...channel,
      values: channel.values.map((value) => Math.fround(value / lbf)).map((value) => value * lbf),
    }));
    const [inNewtons, inPounds] = [
      judge(log, truth.options.machine),
      judge({ ...log, channels }, truth.options.machine),
    ];
    expect(claims(inPounds)).toEqual(claims(inNewtons));
    expect(inPounds.findings.map((one) => one.sentence)).toEqual(inNewtons.findings.map((one) => one.sentence));
  });
});

function keepRecords(log: MachineLog, kept: number[]): MachineLog {
  return {
    ...log,
    records: kept.length,
    timeMs: Float64Array.from(kept, (i) => log.timeMs[i]!),
    longitude: Float64Array.from(kept, (i) => log.longitude[i]!),
    latitude: Float64Array.from(kept, (i) => log.latitude[i]!),
    headingDeg: log.headingDeg && Float32Array.from(kept, (i) => log.headingDeg![i]!),
    speedMps: log.speedMps && Float32Array.from(kept, (i) => log.speedMps![i]!),
    working: log.working && Uint8Array.from(kept, (i) => log.working![i]!),
    loggedPass: log.loggedPass && Int32Array.from(kept, (i) => log.loggedPass![i]!),
    sourceLine: Uint32Array.from(kept, (i) => log.sourceLine[i]!),
    channels: log.channels.map((channel) => ({
      ...channel,
      values: Float32Array.from(
        kept.flatMap((i) => Array.from(channel.values.subarray(i * channel.rows, (i + 1) * channel.rows))),
      ),
    })),
  };
}

describe("the demo fields", () => {
  it("East quarter: names the worn row and the light frame, first things first", () => {
    const verdict = judgeSimulated(LARKSPUR.fields[0]!.seeding.input);
    expect(verdict.rowsStandingOut).toEqual([17]);
    expect(verdict.weight.state).toBe("short");
    expect(verdict.headline[0]).toBe("row-stands-out-row-17");
    expect(verdict.headline).toContain("weight-short");
    expect(verdict.headline.length).toBeLessThanOrEqual(3);
  });

  it("Mill bottom: names the worn row, and refuses to tell band from rows", () => {
    const verdict = judgeSimulated(LARKSPUR.fields[1]!.seeding.input);
    expect(verdict.rowsStandingOut).toEqual([17]);
    const refusal = verdict.findings.find((one) => one.kind === "rows-side-by-side");
    expect(refusal?.sentence).toContain("cannot tell");
    // The worn row has a finding of its own: it is neither in the group nor in the group's size.
    expect(refusal?.rows).not.toContain(17);
    expect(refusal?.sentence).toMatch(
      /^Rows 8 to 16 needed about 2[0-4]\d\u202fN more applied force than the others, side by side: .*cannot tell which\.$/,
    );
    expect(refusal?.confidence).toBe("low");
    expect(verdict.findings.some((one) => one.kind === "wheel-tracks")).toBe(false);
  });
});

describe("findings", () => {
  const verdict = judgeSimulated(LARKSPUR.fields[0]!.seeding.input);

  it("keep to their schema and have ids of their own", () => {
    for (const finding of verdict.findings) expect(Finding.parse(finding)).toEqual(finding);
    expect(new Set(verdict.findings.map((one) => one.id)).size).toBe(verdict.findings.length);
  });

  it("carry number, interval, place, check and caution for a row that stands out", () => {
    const row = verdict.findings[0]!;
    expect(row.value).toBeLessThan(-130);
    expect(row.value).toBeGreaterThan(-170);
    expect(row.interval![0]).toBeLessThan(row.value!);
    expect(row.interval![1]).toBeGreaterThan(row.value!);
    expect(row.place?.type).toBe("LineString");
    expect(row.check).toMatch(/disc, bushing/);
    // No longer together than when the sentence named but two parts and the check repeated the doubt.
    expect(row.sentence.length + row.check.length).toBeLessThan(330);
    expect(row.caution).toMatch(/lock and block/);
  });

  it("say themselves in SI, and again in a reader's own units", () => {
    const row = verdict.findings[0]!;
    expect(row.sentence).toMatch(
      /^Row 17 carried 1\d\d\u202fN less on its gauge wheel than the other rows on 9\d(\.\d)?\u202f% of the distance\. Check its disc, bushing, gauge wheel and sensor: which of them, this log cannot tell\.$/,
    );
    expect(sayFinding(row, "metric")).toBe(row.sentence);
    expect(sayFinding(row, "imperial")).toMatch(/carried 3\d\u202flbf less/);
  });

  it("leave no name of a number standing in any sentence", () => {
    for (const finding of verdict.findings) expect(finding.sentence).not.toMatch(/[{}]|NaN|undefined|null/);
  });
});

describe("with less to go on the verdict says what is missing", () => {
  const { log, truth } = simulateSeedingLog({ ...WORN, shape: { kind: "block", passes: 4, passLengthM: 80 } });
  const only = (id: string): MachineLog => ({ ...log, channels: log.channels.filter((channel) => channel.id === id) });

  it("without a machine", () => {
    const verdict = judge(log, null);
    expect(verdict.weight).toMatchObject({ state: "unknown", headroomN: null, shareLiftedM2: null });
    expect(verdict.rowsUnderTarget).toEqual([]);
    expect(verdict.known).toEqual({ underTarget: false, atLimit: false });
    expect(verdict.rowsStandingOut).toEqual([17]);
    expect(verdict.missing.join(" ")).toContain("which machine made the log");
  });

  it("without a target or a limit, which no empty list stands for", () => {
    const { targetMarginN, maxDownforceN, ...machine } = truth.options.machine;
    expect(judge(log, truth.options.machine).known).toEqual({ underTarget: true, atLimit: true });
    expect(judge(log, { ...machine, maxDownforceN }).known).toEqual({ underTarget: false, atLimit: true });
    expect(judge(log, { ...machine, targetMarginN }).known).toEqual({ underTarget: true, atLimit: false });
  });

  it("of a harvest log only that it is one", () => {
    const verdict = judge({ ...log, kind: "harvest" }, truth.options.machine);
    expect(verdict.findings.map(({ kind, severity, sentence }) => ({ kind, severity, sentence }))).toEqual([
      {
        kind: "not-a-seeding-log",
        severity: "ok",
        sentence: "This is a harvest log; seeding verdicts do not apply.",
      },
    ]);
    expect(verdict).toMatchObject({
      rowsStandingOut: [],
      known: { underTarget: false, atLimit: false },
      weight: { state: "unknown" },
    });
    expect(VerdictBody.parse(verdict).known).toEqual({ underTarget: false, atLimit: false });
  });

  it("without forces", () => {
    const verdict = judge(only("margin"), truth.options.machine);
    expect(verdict.known).toEqual({ underTarget: true, atLimit: false });
    expect(verdict.rowsStandingOut).toEqual([17]);
    expect(verdict.weight.missing.join()).toContain("force applied to each row");
    expect(verdict.resistanceCensoredShare).toBeNull();
  });

  it("with one value for the whole machine", () => {
    const averaged = log.channels.map((channel) => ({
      ...channel,
      rows: 1,
      perRow: false,
      values: Float32Array.from({ length: log.records }, (_, i) => channel.values[i * 24]!),
    }));
    const verdict = judge({ ...log, rows: 1, channels: averaged }, truth.options.machine);
    expect(verdict.rowsStandingOut).toEqual([]);
    expect(verdict.missing).toContain("The file is row-averaged: rows cannot be ranked.");
    expect(verdict.findings.some((one) => one.kind === "rows-alike")).toBe(false);
  });

  it("with two passes a row is looked at, not blamed", () => {
    const verdict = judgeSimulated({ ...WORN, shape: { kind: "block", passes: 2, passLengthM: 80 } });
    const row = verdict.findings.find((one) => one.kind === "row-stands-out");
    expect(row).toMatchObject({ severity: "look", confidence: "low", interval: null });
    expect(row?.sentence).toContain("cannot tell the row from the ground");
  });
});
