import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { commonStep } from "@/lib/channels/common-step";
import { resolveChannel } from "@/lib/channels/resolve-channel";
import { codeOf, valueOfCode, valueScale } from "@/lib/tiles/value-scale";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

/** Readings spread over all residues: record and row make other multiples of each step. */
function place(forceStepN: number, marginStepN: number) {
  // Five rows, so that the median of the other four may lie between two readings.
  const log = makeLog({
    rows: 5,
    records: straightTrack({ from: [0, 0], headingDeg: 0, records: 60 }),
    channels: [
      {
        id: "downforce",
        resolution: forceStepN,
        value: (record, row) => forceStepN * (10 + ((record * 7 + row * 3) % 11)),
      },
      { id: "margin", resolution: marginStepN, value: (record, row) => marginStepN * (1 + ((record * 5 + row) % 7)) },
    ],
  });
  const built = buildLog(log, makeSeeder({ rowCount: 5, rowUnitMassKg: 82 }));
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

/** The furthest that a tile's number is from the reading it stands for. */
function worstError(values: Float32Array, resolution: number | null): number {
  const scale = valueScale({ values, resolution });
  return values.reduce((worst, value) => {
    if (Number.isNaN(value)) return worst;
    return Math.max(worst, Math.abs(valueOfCode(codeOf(value, scale), scale) - value));
  }, 0);
}

describe("the steps of a derived channel", () => {
  for (const [forceStepN, marginStepN] of [
    [50, 100],
    [100, 50],
    [50, 30],
    [4.4482216, 10],
  ] as const) {
    it(`are no coarser than its readings, from steps of ${forceStepN} and ${marginStepN}`, () => {
      const placed = place(forceStepN, marginStepN);
      for (const id of ["resistance", "deviation:downforce", "deviation:resistance"]) {
        const channel = resolveChannel(placed, id)!;
        const finestN = Math.min(forceStepN, marginStepN);
        expect(channel.resolution!).toBeLessThanOrEqual(finestN);
        expect(worstError(channel.values, channel.resolution)).toBeLessThanOrEqual(channel.resolution! / 2 + 1e-3);
      }
    });
  }

  it("decode to the very reading where the inputs share a step", () => {
    const channel = resolveChannel(place(50, 100), "resistance")!;
    expect(channel.resolution).toBe(50);
    expect(worstError(channel.values, channel.resolution)).toBeLessThan(1e-3);
    const deviation = resolveChannel(place(50, 100), "deviation:downforce")!;
    expect(worstError(deviation.values, deviation.resolution)).toBeLessThan(1e-3);
    const uneven = resolveChannel(place(50, 30), "resistance")!;
    expect(uneven.resolution).toBe(10);
    expect(worstError(uneven.values, uneven.resolution)).toBeLessThan(1e-3);
  });
});

describe("commonStep", () => {
  it("is the greatest common divisor (hand-worked)", () => {
    expect(commonStep(50, 100)).toBe(50);
    expect(commonStep(30, 50)).toBe(10);
    expect(commonStep(0.1, 0.25)).toBeCloseTo(0.05, 12);
    expect(commonStep(1, 5)).toBe(1);
  });

  it("takes a channel that never changes for no channel", () => {
    expect(commonStep(null, 5)).toBe(5);
    expect(commonStep(5, null)).toBe(5);
    expect(commonStep(null, null)).toBeNull();
  });

  it("does not run away where two steps share none", () => {
    expect(commonStep(1, Math.PI)).toBeGreaterThanOrEqual(1 / 64);
    expect(commonStep(1, 5.000001)).toBe(1);
  });
});
