import { describe, expect, it } from "vitest";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { simulateQuiet, UNIT_WEIGHT_N, valuesOf } from "@/tests/lib/simulator/quiet-log";

describe("simulateSeedingLog", () => {
  it("gives the same log for the same seed and another for another", () => {
    const first = simulateSeedingLog({ seed: 5 });
    const again = simulateSeedingLog({ seed: 5 });
    const other = simulateSeedingLog({ seed: 6 });
    expect(again).toEqual(first);
    expect(valuesOf(other.log, "downforce")).not.toEqual(valuesOf(first.log, "downforce"));
  });

  it("keeps giving the log it gave when this test was written", () => {
    const { log } = simulateSeedingLog({ seed: 5, soil: { ...SOIL, noiseN: 50 } });
    // Made by this program (a regression mark, not an outside value): forces are whole newtons, so the hash is of integers.
    expect(log.records).toBe(2101);
    expect(hashOf(valuesOf(log, "downforce"))).toBe("759a03dc");
    expect(hashOf(valuesOf(log, "margin"))).toBe("a4c6d0d");
  });

  it("does not shift one cause's numbers when another is switched on", () => {
    const plain = simulateSeedingLog({ seed: 5 }).log;
    const worn = simulateSeedingLog({ seed: 5, wornRow: { row: 9, extraForceN: 100, marginLossN: 0 } }).log;
    const row = 3;
    for (let record = 0; record < plain.records; record += 1) {
      const at = record * plain.rows + row;
      expect(valuesOf(worn, "downforce")[at]).toBe(valuesOf(plain, "downforce")[at]);
    }
  });

  it("never logs a margin or force below 0, nor a force above the limit", () => {
    const { log } = simulateSeedingLog({
      seed: 8,
      soil: { ...SOIL, noiseN: 300 },
      noise: { downforceN: 40, marginN: 80, depthM: 0.004, headingDeg: 0, positionM: 0 },
    });
    expect(valuesOf(log, "margin").every((value) => value >= 0)).toBe(true);
    expect(valuesOf(log, "downforce").every((value) => value >= 0 && value <= 1600)).toBe(true);
  });

  it("keeps applied force + unit weight - margin equal to the resistance while the wheel is on the ground", () => {
    const { log, truth } = simulateQuiet({
      baseResistanceN: 1400,
      soil: { ...SOIL, noiseN: 150, noiseRangeM: 8 },
      controller: { mode: "fixed", forceN: 700 },
    });
    const margin = valuesOf(log, "margin");
    const force = valuesOf(log, "downforce");
    let onGround = 0;
    let off = 0;
    truth.resistanceN.forEach((resistanceN, at) => {
      if (Number.isNaN(resistanceN)) return;
      const asked = (force[at] ?? NaN) + UNIT_WEIGHT_N - (margin[at] ?? NaN);
      if ((margin[at] ?? 0) > 0) {
        onGround += 1;
        expect(Math.abs(asked - resistanceN)).toBeLessThan(0.001);
      } else {
        off += 1;
        // Wheel off the ground: only a lower bound of what full depth would have asked.
        expect(asked).toBeLessThanOrEqual(resistanceN + 0.001);
      }
    });
    expect(onGround).toBeGreaterThan(1000);
    expect(off).toBeGreaterThan(100);
  });

  it("logs lifted records with no force and no depth, or leaves them out", () => {
    const withTurns = simulateQuiet({});
    const without = simulateQuiet({ logTurns: false });
    const turning = withTurns.log.working?.findIndex((working) => working === 0) ?? -1;
    expect(turning).toBeGreaterThan(0);
    expect(valuesOf(withTurns.log, "downforce")[turning * 24]).toBe(0);
    expect(valuesOf(withTurns.log, "depth")[turning * 24]).toBeNaN();
    expect(without.log.records).toBe(withTurns.log.working?.reduce((sum, working) => sum + working, 0));
    expect(without.truth.channels).toEqual(withTurns.truth.channels);
  });

  it("names the option it cannot simulate", () => {
    expect(() => simulateSeedingLog({ recordIntervalS: 0 })).toThrow(
      "resolveSimulationOptions: recordIntervalS must be above 0, got 0",
    );
    expect(() => simulateSeedingLog({ frameLifts: true })).toThrow("frameLifts needs a machine with a frame");
  });
});

const SOIL = { gradientEastNPerM: 0, gradientNorthNPerM: 0, noiseN: 0, noiseRangeM: 25 };

/** FNV-1a over the values rounded to integers. */
function hashOf(values: Float32Array): string {
  let hash = 0x811c9dc5;
  for (const value of values) hash = Math.imul(hash ^ Math.round(value), 0x01000193) >>> 0;
  return hash.toString(16);
}
