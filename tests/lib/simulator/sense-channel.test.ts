import { describe, expect, it } from "vitest";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { QUIET_BANDS, simulateQuiet, valuesOf } from "@/tests/lib/simulator/quiet-log";

describe("sensors", () => {
  it("store a channel its latency late", () => {
    const bands = QUIET_BANDS;
    const prompt = valuesOf(simulateQuiet({ bands }).log, "downforce");
    const late = valuesOf(simulateQuiet({ bands, latencyS: { downforce: 1.5, margin: 0, depth: 0 } }).log, "downforce");
    // 1.5 s are three records of 0.5 s.
    expect(late.subarray(3 * 24)).toEqual(prompt.subarray(0, prompt.length - 3 * 24));
  });

  it("drift by the hour, which shows while lifted", () => {
    const { log, truth } = simulateQuiet({ driftNPerHour: [0, 30, -30] });
    const margin = valuesOf(log, "margin");
    const last = truth.passOfRecord.lastIndexOf(0);
    const hours = ((log.timeMs[last] ?? NaN) - (log.timeMs[0] ?? NaN)) / 3_600_000;
    expect(hours).toBeGreaterThan(0.02);
    expect(margin[last * 24]).toBe(0);
    expect(margin[last * 24 + 1]).toBeCloseTo(30 * hours, 4);
    expect(margin[last * 24 + 2]).toBeCloseTo(-30 * hours, 4);
  });

  it("lose the stated share of readings", () => {
    const { log } = simulateSeedingLog({ seed: 4, missingShare: 0.05 });
    const values = valuesOf(log, "downforce");
    const missing = values.reduce((sum, value) => sum + (Number.isNaN(value) ? 1 : 0), 0) / values.length;
    expect(Math.abs(missing - 0.05)).toBeLessThan(0.005);
  });

  it("add noise of the stated size", () => {
    const { truth } = simulateSeedingLog({ seed: 4, controller: { mode: "active", lagS: 0, targetMarginN: 450 } });
    // Defaults: 12 N on force, 40 N on margin, 2 mm on depth; about 1700 readings a row.
    expect(truth.channels.map((channel) => meanSd(channel.rows))).toEqual([
      expect.closeTo(12, 0),
      expect.closeTo(40, -1),
      expect.closeTo(0.002, 4),
    ]);
  });
});

function meanSd(rows: { sd: number }[]): number {
  return rows.reduce((sum, row) => sum + row.sd, 0) / rows.length;
}
