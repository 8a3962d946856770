import { describe, expect, it } from "vitest";
import { SIMULATION_DEFAULTS, type SimulationInput } from "@/lib/simulator/simulation-options";
import { simulateHarvestLog } from "@/lib/simulator/simulate-harvest-log";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { estimate, estimateSimulated, holds, place, SEEDS, textured } from "@/tests/lib/alignment/delay-log";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

const { machine, soil, speed } = SIMULATION_DEFAULTS;
const MANY_SEEDS_MS = 300_000;

describe("a delay put into a simulated field", () => {
  it.each([0, 1.5, 3.2, -1, 8])(
    "of %s s is found within 0.2 s and lies in its interval",
    { timeout: MANY_SEEDS_MS },
    (latencyS) => {
      const estimates = SEEDS.map((seed) => estimateSimulated(textured(seed, latencyS)));
      const near = estimates.filter(({ delayS }) => delayS !== null && Math.abs(delayS - latencyS) <= 0.2);
      const covered = estimates.filter(({ delayIntervalS }) => holds(delayIntervalS, latencyS));
      expect(near.length).toBeGreaterThanOrEqual(0.95 * SEEDS.length);
      expect(covered.length).toBeGreaterThanOrEqual(0.9 * SEEDS.length);
      // Speeds of 2.25 to 2.55 m/s cannot tell a delay from a distance, and that is said.
      expect(estimates.filter(({ separable, distanceM }) => separable || distanceM !== null)).toEqual([]);
    },
  );

  it("is told from a distance where passes are driven at different speeds", { timeout: MANY_SEEDS_MS }, () => {
    const fast: SimulationInput = {
      speed: { ...speed, variationMps: 0.9 },
      shape: { kind: "block", passes: 20, passLengthM: 200 },
    };
    // The machine's measures say 1.2 m too much: rows stand 1.2 m ahead of where they are placed.
    const wrong = { ...machine, antennaToRowsM: machine.antennaToRowsM + 1.2 };
    const seeds = SEEDS.slice(0, 20);
    const late = seeds.map((seed) => estimateSimulated(textured(seed, 1.5, fast), wrong));
    const displaced = seeds.map((seed) => estimateSimulated(textured(seed, 0, fast), wrong));
    expect(late.concat(displaced).filter(({ separable }) => !separable)).toEqual([]);
    const count = (list: boolean[]) => list.filter(Boolean).length;
    expect(count(late.map(({ delayS }) => Math.abs(delayS! - 1.5) <= 0.2))).toBeGreaterThanOrEqual(19);
    expect(count(displaced.map(({ delayS }) => Math.abs(delayS!) <= 0.2))).toBeGreaterThanOrEqual(19);
    for (const estimates of [late, displaced]) {
      expect(count(estimates.map(({ distanceM }) => Math.abs(distanceM! + 1.2) <= 0.5))).toBeGreaterThanOrEqual(19);
      expect(count(estimates.map(({ distanceIntervalM }) => holds(distanceIntervalM, -1.2)))).toBeGreaterThanOrEqual(
        18,
      );
    }
  });

  it("is found though residue bands lie askew to the passes, rows differ and sensors have their own zero", () => {
    const bands = { headingDeg: 15, periodM: 6.096, widthM: 3, sideShiftM: 0, contrastN: 200 };
    const input = textured(5, 1.5, {
      bands: { ...bands, through: [-98.612, 38.417] },
      wornRow: { row: 7, extraForceN: 200, marginLossN: 150 },
      rowSpread: { resistanceN: 60, marginZeroN: 80 },
      missingShare: 0.05,
    });
    const found = estimateSimulated(input);
    expect(found.state).toBe("estimated");
    expect(Math.abs(found.delayS! - 1.5)).toBeLessThan(0.2);
  });

  it("is the same answer every time", () => {
    expect(estimateSimulated(textured(3, 1.5))).toEqual(estimateSimulated(textured(3, 1.5)));
  });
});

describe("against another program", () => {
  it("agrees with cross-correlation and with spline interpolation in SciPy", () => {
    const field = (s: number, u: number) =>
      60 * Math.sin(0.21 * s + 0.05 * u) + 45 * Math.sin(0.47 * s + 1.3 + 0.03 * u) + 30 * Math.sin(0.093 * s + 0.4);
    const noise = (pass: number, i: number) => {
      const x = Math.sin(pass * 12.9898 + i * 78.233) * 43758.5453;
      return 80 * (x - Math.floor(x) - 0.5);
    };
    const records = Array.from({ length: 8 }, (_, pass) =>
      straightTrack({
        from: [6 * pass, pass % 2 === 0 ? 0 : 199],
        headingDeg: pass % 2 === 0 ? 0 : 180,
        records: 200,
        stepM: 1,
        startS: pass * 120,
        stepS: 0.5,
      }).map((record) => ({ ...record, pass: pass + 1, working: true })),
    ).flat();
    const value = (record: number) => {
      const pass = Math.floor(record / 200);
      const i = record % 200;
      const isForward = pass % 2 === 0;
      const ground = (isForward ? i : 199 - i) - (isForward ? 1 : -1) * 3;
      return 500 + 10 * pass + field(ground, 6 * pass) + noise(pass, i);
    };
    const log = makeLog({ records, channels: [{ id: "margin", value }] });
    const found = estimate(place(log, makeSeeder({ rowSpacingM: 1.5 })));
    expect(found.pairs).toBe(7);
    // SciPy 1.17.1: scipy.signal.correlate of the passes of each pair, summed over pairs, peak refined by a parabola.
    expect(Math.abs(found.delayS! - 1.4958)).toBeLessThan(0.05);
    // SciPy 1.17.1: scipy.interpolate.CubicSpline, least mean squared difference, parabola over 0.6 s either side.
    expect(Math.abs(found.delayS! - 1.5089)).toBeLessThan(0.05);
    // The same: the ratio of the least J to the median J over -3 to 20 s was 1115 / 7596; ours is smoothed before.
    expect(1 - found.sharpness!).toBeLessThan(1115 / 7596);
  });
});

describe("a log that cannot tell is refused with the reason", () => {
  it("without six opposite pairs", () => {
    const four = estimateSimulated(textured(1, 1.5, { shape: { kind: "block", passes: 4, passLengthM: 200 } }));
    expect(four).toMatchObject({ state: "refused", refusal: "few-pairs", pairs: 3, delayS: null });
  });

  it("driven in one direction only", () => {
    const { log } = simulateSeedingLog(
      textured(1, 1.5, {
        shape: { kind: "block", passes: 20, passLengthM: 160 },
        logTurns: false,
        logPassNumbers: true,
      }),
    );
    const keep = Array.from({ length: log.records }, (_, i) => i).filter((i) => log.loggedPass![i]! % 2 === 1);
    const oneWay = makeSubset(log, keep);
    const found = estimate(place(oneWay));
    expect(found).toMatchObject({ state: "refused", refusal: "few-pairs", pairs: 0 });
  });

  it("on flat fields: no delay is ever told", { timeout: MANY_SEEDS_MS }, () => {
    const flat = { soil: { ...soil, noiseN: 0 } };
    for (const latencyS of [0, 1.5]) {
      const told = SEEDS.map((seed) => estimateSimulated(textured(seed, latencyS, flat)));
      expect(told.filter(({ state }) => state === "estimated")).toEqual([]);
    }
  });

  it(
    "of a margin that a controller holds at its target: it turns with the direction of travel",
    { timeout: MANY_SEEDS_MS },
    () => {
      const controller = { mode: "active", lagS: 0.6, targetMarginN: 450 } as const;
      for (const noiseRangeM of [3, 10, 20]) {
        const told = SEEDS.slice(0, 12).map((seed) =>
          estimateSimulated(textured(seed, 1.5, { controller, soil: { ...soil, noiseN: 120, noiseRangeM } })),
        );
        expect(told.filter(({ state }) => state === "estimated")).toEqual([]);
      }
    },
  );

  it("where the delay lies beyond what is tried", () => {
    expect(estimateSimulated(textured(2, 20))).toMatchObject({ state: "refused", refusal: "at-the-edge" });
  });

  it("where nothing varies", () => {
    const { log } = simulateSeedingLog(textured(1, 0));
    log.channels[0]!.values.fill(450);
    expect(estimate(place(log))).toMatchObject({ state: "refused", refusal: "nothing-varies", sharpness: null });
  });

  it("without times", () => {
    const { log } = simulateSeedingLog(textured(1, 0));
    log.timeMs.fill(NaN);
    expect(estimate(place(log))).toMatchObject({ state: "refused", refusal: "no-times" });
  });
});

describe("a channel logged once for the machine", () => {
  it("grain flow is compared for each metre driven, and its delay found", () => {
    const { log } = simulateHarvestLog({
      seed: 4,
      combine: { kind: "combine", name: "Header", headerWidthM: 6.096 },
      origin: [-98.612, 38.417],
      ring: [
        [-98.6132, 38.4158],
        [-98.6108, 38.4158],
        [-98.6108, 38.4186],
        [-98.6132, 38.4186],
      ],
      speed: { meanMps: 1.9, variationMps: 0.3, variationPeriodS: 40, turnShare: 0.8, noiseMps: 0.02 },
      flowNoise: 0.03,
    });
    const placed = place(log, null);
    const flow = placed.log.channels.find(({ id }) => id === "yieldFlow")!;
    const made = flow.values.map((_, record) => {
      const cut = record - 8;
      if (cut < 0 || placed.passOf[cut] === 0) return 0;
      const [east, north] = [placed.originEastM[cut]!, placed.originNorthM[cut]!];
      const yieldKgPerM2 = 0.5 + 0.08 * Math.sin(north / 9 + east / 30) + 0.05 * Math.sin(north / 4.3 - east / 25);
      return yieldKgPerM2 * 6.096 * placed.speedMps[cut]!;
    });
    flow.values.set(made);
    const found = estimate(placed, "yieldFlow");
    expect(found).toMatchObject({ state: "estimated", share: 1 });
    // Records are 1 s apart.
    expect(Math.abs(found.delayS! - 8)).toBeLessThan(0.2);
  });
});

/** The named records of a log, in order. */
function makeSubset(log: ReturnType<typeof simulateSeedingLog>["log"], keep: number[]): typeof log {
  return {
    ...log,
    records: keep.length,
    timeMs: Float64Array.from(keep, (i) => log.timeMs[i]!),
    longitude: Float64Array.from(keep, (i) => log.longitude[i]!),
    latitude: Float64Array.from(keep, (i) => log.latitude[i]!),
    headingDeg: log.headingDeg && Float32Array.from(keep, (i) => log.headingDeg![i]!),
    speedMps: log.speedMps && Float32Array.from(keep, (i) => log.speedMps![i]!),
    working: log.working && Uint8Array.from(keep, (i) => log.working![i]!),
    loggedPass: log.loggedPass && Int32Array.from(keep, (i) => log.loggedPass![i]!),
    sourceLine: Uint32Array.from(keep, (i) => log.sourceLine[i]!),
    channels: log.channels.map((channel) => ({
      ...channel,
      values: Float32Array.from(
        keep.flatMap((i) => [...channel.values.subarray(i * channel.rows, (i + 1) * channel.rows)]),
      ),
    })),
  };
}
