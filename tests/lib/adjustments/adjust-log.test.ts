// On simulated fields whose truth is known: what was put in is found, what was not is left alone.
import { describe, expect, it } from "vitest";
import { adjustLog } from "@/lib/adjustments/adjust-log";
import { adjustPart } from "@/lib/adjustments/adjust-part";
import { isAsRead, noAdjustments, type Adjustments } from "@/lib/adjustments/adjustments";
import { buildLog } from "@/lib/build/build-log";
import { resolveChannel } from "@/lib/channels/resolve-channel";
import { ruleNumber } from "@/lib/cleaning/rule-catalogue";
import { logParts } from "@/lib/export/log-parts";
import { passVerdict } from "@/lib/findings/pass-verdict";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import type { SimulationInput } from "@/lib/simulator/simulation-options";
import { rowStatistics } from "@/lib/statistics/row-statistics";
import { rulesWith } from "@/tests/lib/cleaning/make-placed";

const FIELD: SimulationInput = { shape: { kind: "block", passes: 8, passLengthM: 150 } };

function simulate(seed: number, input: SimulationInput = {}): PlacedLog {
  const { log, truth } = simulateSeedingLog({ ...FIELD, ...input, seed });
  const built = buildLog(log, truth.options.machine);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}
const withRules = (changes: Parameters<typeof rulesWith>[0]): Adjustments => ({
  delaysS: {},
  cleaning: rulesWith(changes),
});
const channelOf = (placed: PlacedLog, id: string) => placed.log.channels.find((channel) => channel.id === id)!;

/** A copy whose margin is changed by hand. */
function edited(placed: PlacedLog, edit: (values: Float32Array, rows: number) => void): PlacedLog {
  const channels = placed.log.channels.map((channel) => {
    if (channel.id !== "margin") return channel;
    const values = Float32Array.from(channel.values);
    edit(values, channel.rows);
    return { ...channel, values };
  });
  return { ...placed, log: { ...placed.log, channels } };
}

const clean = simulate(5);
const { rows } = channelOf(clean, "margin");
/** Records of the third pass, well away from its ends. */
const third = clean.passes[2]!;

describe("a log without adjustments", () => {
  it("is the very same log, with the very same verdict", () => {
    const { placed, cleaned } = adjustLog(clean, noAdjustments());
    expect(placed).toBe(clean);
    expect(cleaned).toBeNull();
    expect(isAsRead(noAdjustments())).toBe(true);
  });

  it("comes back bit by bit when a rule is switched off again", () => {
    const before = { rows: rowStatistics(clean, "margin").items, verdict: passVerdict(clean) };
    const copies = clean.log.channels.map(({ values }) => Float32Array.from(values));
    const cut = adjustLog(clean, withRules({ "start-ramp": { on: true, distanceM: 20, timeS: 0 } }));
    expect(rowStatistics(cut.placed, "margin").items).not.toEqual(before.rows);
    clean.log.channels.forEach(({ values }, k) => expect(values).toEqual(copies[k]));
    const back = adjustLog(clean, withRules({ "start-ramp": { on: false, distanceM: 20, timeS: 0 } })).placed;
    expect({ rows: rowStatistics(back, "margin").items, verdict: passVerdict(back) }).toEqual(before);
  });
});

describe("passes, distances and places", () => {
  it("stay as they were whatever is left out", () => {
    const { placed } = adjustLog(clean, withRules({ "start-ramp": { on: true }, "local-outlier": { on: true } }));
    for (const key of ["passes", "passOf", "flags", "originEastM", "headingDeg", "geometry"] as const) {
      expect(placed[key]).toBe(clean[key]);
    }
  });
});

describe("what was put into a simulated field", () => {
  it("a sensor that hangs for 40 records is found to the record", () => {
    const from = third.first + 30;
    const stuck = edited(clean, (values) => {
      for (let i = from; i < from + 40; i++) values[i * rows + 6] = 423;
    });
    const { placed } = adjustLog(stuck, withRules({ "sensor-stuck": { on: true } }));
    const before = channelOf(stuck, "margin").values;
    const out = [...channelOf(placed, "margin").values].flatMap((value, at) =>
      Number.isNaN(value) && !Number.isNaN(before[at]!) ? [at] : [],
    );
    const wanted = Array.from({ length: 40 }, (_, k) => (from + k) * rows + 6);
    expect(out).toEqual(expect.arrayContaining(wanted));
    expect(out.length).toBeLessThanOrEqual(wanted.length + 2);
  });

  it("spikes of ten usual spreads are found, nearly all of them", () => {
    let found = 0;
    let put = 0;
    for (let seed = 1; seed <= 5; seed++) {
      const placed = simulate(seed);
      const spikes = new Set<number>();
      const spiked = edited(placed, (values) => {
        for (const pass of placed.passes) {
          for (let i = pass.first + 20; i < pass.first + pass.records - 20; i += 37) {
            const at = i * rows + (i % rows);
            if (Number.isNaN(values[at]!)) continue;
            values[at] = values[at]! + 1500;
            spikes.add(at);
          }
        }
      });
      const { values } = channelOf(adjustLog(spiked, withRules({ "local-outlier": { on: true } })).placed, "margin");
      put += spikes.size;
      found += [...spikes].filter((at) => Number.isNaN(values[at]!)).length;
    }
    expect(put).toBeGreaterThan(80);
    expect(found / put).toBeGreaterThan(0.98);
  });

  it("the slow rise of force after lowering goes with the first metres", () => {
    const ramped = simulate(5, { startRamp: { lengthM: 12, fromShare: 0.2 } });
    const { placed } = adjustLog(ramped, withRules({ "start-ramp": { on: true, distanceM: 12, timeS: 0 } }));
    const low = (log: PlacedLog) => rowStatistics(log, "downforce").items.map((item) => item.p05!);
    const [before, after] = [low(ramped), low(placed)];
    after.forEach((value, row) => expect(value).toBeGreaterThan(before[row]!));
  });

  it("a delay of 2 s is taken back: the channel is as it would have been logged at once", () => {
    const quiet: SimulationInput = {
      noise: { downforceN: 0, marginN: 0, depthM: 0, headingDeg: 0, positionM: 0 },
      missingShare: 0,
      soil: { gradientEastNPerM: 0, gradientNorthNPerM: 0, noiseN: 120, noiseRangeM: 6 },
    };
    const prompt = simulate(5, { ...quiet, latencyS: { downforce: 0, margin: 0, depth: 0 } });
    const late = simulate(5, { ...quiet, latencyS: { downforce: 2, margin: 0, depth: 0 } });
    const { placed } = adjustLog(late, { ...noAdjustments(), delaysS: { downforce: 2 } });
    const [wanted, before, after] = [prompt, late, placed].map((log) => channelOf(log, "downforce").values);
    const pass = prompt.passes[2]!;
    const row3 = Array.from({ length: pass.records - 20 }, (_, k) => (pass.first + 10 + k) * rows + 3);
    const apartN = (values: Float32Array) =>
      row3.reduce((sum, at) => sum + Math.abs(values[at]! - wanted![at]!), 0) / row3.length;
    expect(apartN(before!)).toBeGreaterThan(3);
    expect(apartN(after!)).toBeLessThan(1);
    expect(channelOf(placed, "margin")).toBe(channelOf(late, "margin"));
    expect(placed.leftOut).toBeUndefined();
  });
});

describe("what was not put in", () => {
  it("is left alone: on clean fields less than one reading in 200 stands alone, and no sensor hangs", () => {
    for (let seed = 1; seed <= 10; seed++) {
      const placed = simulate(seed, {
        soil: { gradientEastNPerM: 0.2, gradientNorthNPerM: 0.1, noiseN: 50, noiseRangeM: 30 },
      });
      for (const code of ["local-outlier", "sensor-stuck", "physical-range", "overlap"] as const) {
        const adjusted = adjustLog(placed, withRules({ [code]: { on: true } }));
        for (const id of ["margin", "downforce", "depth"]) {
          const before = channelOf(placed, id).values.filter((value) => value === value).length;
          const after = channelOf(adjusted.placed, id).values.filter((value) => value === value).length;
          const limit = code === "local-outlier" ? 0.005 : 0.001;
          expect({ seed, code, id, isFew: (before - after) / before < limit }).toMatchObject({ isFew: true });
        }
      }
    }
  });
});

describe("the channel of reasons", () => {
  it("carries the number of the first rule, and nothing where all is kept", () => {
    const { placed } = adjustLog(
      clean,
      withRules({
        "start-ramp": { on: true, distanceM: 10, timeS: 0 },
        "physical-range": { on: true, marginMaxN: 400 },
      }),
    );
    const flags = resolveChannel(placed, "flags")!;
    const margin = channelOf(clean, "margin").values;
    const [ramp, beyond] = [ruleNumber("start-ramp"), ruleNumber("physical-range")];
    const first = third.first * flags.rows;
    expect([...flags.values.subarray(first, first + flags.rows)]).toEqual(new Array(flags.rows).fill(ramp));
    const later = (third.first + 60) * flags.rows;
    for (let row = 0; row < flags.rows; row++) {
      expect(flags.values[later + row]).toBe(margin[later + row]! > 400 ? beyond : NaN);
    }
    expect([...resolveChannel(clean, "flags")!.values].every(Number.isNaN)).toBe(true);
  });
});

describe("a log adjusted part by part", () => {
  it("is the same as the whole", () => {
    const adjustments: Adjustments = {
      delaysS: { margin: 0.8 },
      cleaning: rulesWith({ "start-ramp": { on: true }, "local-outlier": { on: true }, overlap: { on: true } }),
    };
    const { placed, cleaned } = adjustLog(clean, adjustments);
    const whole = [...logParts(placed)];
    [...logParts(clean)].forEach((part, k) => {
      const adjusted = adjustPart(part, { ...adjustments, leftOut: cleaned }).placed;
      adjusted.log.channels.forEach(({ values }, c) =>
        expect([...values]).toEqual([...whole[k]!.placed.log.channels[c]!.values]),
      );
    });
  });
});
