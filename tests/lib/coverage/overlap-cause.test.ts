import { describe, expect, it } from "vitest";
import { measureCoverage } from "@/lib/coverage/measure-coverage";
import type { OverlapCause } from "@/lib/schemas/coverage";
import { buildLog } from "@/lib/build/build-log";
import { makeLog, makeSeeder, straightTrack, type MadeRecord } from "@/tests/support/make-log";

const TEN_METRES = makeSeeder({ rowCount: 40, rowSpacingM: 0.25 });

/** A pass of `lengthM` whose first cell reaches back to its start. */
function pass(from: [number, number], headingDeg: number, lengthM: number, startS: number): MadeRecord[] {
  const heading = (headingDeg * Math.PI) / 180;
  const start: [number, number] = [from[0] + 0.5 * Math.sin(heading), from[1] + 0.5 * Math.cos(heading)];
  return straightTrack({ from: start, headingDeg, records: lengthM / 0.5, startS });
}

function measure(passes: MadeRecord[][], value: (record: number, row: number) => number = () => 900) {
  const channels = [{ id: "downforce" as const, value }];
  const built = buildLog(makeLog({ records: passes.flat(), rows: 40, channels }), TEN_METRES);
  if (!built.ok) throw new Error(built.error.message);
  return measureCoverage(built.value.placed);
}

const areaOf = (found: ReturnType<typeof measure>, cause: OverlapCause) =>
  found.overlapByCause.find((item) => item.cause === cause)?.areaM2 ?? NaN;

/** Four long passes north, 10 m wide each and 10 m apart, so that north is the main axis. */
const FIELD = [0, 1, 2, 3].map((k) => pass([10 * k, k % 2 === 0 ? 0 : 200], k % 2 === 0 ? 0 : 180, 200, 200 * k));

describe("overlap by cause (areas hand-worked)", () => {
  it("adds up to the overlap, in a fixed order", () => {
    const found = measure([...FIELD, pass([-5, 203], 90, 40, 2000)]);
    expect(found.overlapByCause.map((item) => item.cause)).toEqual(["headland", "point-row", "guess-row", "other"]);
    const sum = found.overlapByCause.reduce((all, item) => all + item.areaM2, 0);
    expect(sum).toBeCloseTo(found.overlapM2, 6);
  });

  it("two 100 x 10 m strips 9 m apart: 100 m2 along the guess row", () => {
    const found = measure([pass([0, 0], 0, 100, 0), pass([9, 100], 180, 100, 100)]);
    expect(Math.abs(areaOf(found, "guess-row") - 100)).toBeLessThan(4);
    expect(areaOf(found, "headland") + areaOf(found, "point-row")).toBe(0);
  });

  it("a headland pass square across four passes, 2 m into them: 80 m2", () => {
    const found = measure([...FIELD, pass([-5, 203], 90, 40, 2000)]);
    expect(Math.abs(areaOf(found, "headland") - 80)).toBeLessThan(4);
    expect(areaOf(found, "point-row")).toBe(0);
    expect(areaOf(found, "other")).toBeLessThan(2);
  });

  it("a pass across another at 45 degrees: 100 / sin 45 = 141.42 m2 of point rows", () => {
    const found = measure([...FIELD, pass([-300, 100], 0, 200, 2000), pass([-340, 160], 135, 120, 3000)]);
    expect(Math.abs(areaOf(found, "point-row") - 141.42)).toBeLessThan(4);
    expect(areaOf(found, "guess-row")).toBeLessThan(4);
  });

  it("the same line driven again: its whole ground, and no guess row", () => {
    const found = measure([...FIELD, pass([0, 0], 0, 100, 3000)]);
    expect(Math.abs(areaOf(found, "other") - 1000)).toBeLessThan(10);
    expect(areaOf(found, "guess-row")).toBeLessThan(4);
  });

  it("a pass that goes on five seconds after a stop is one working, not a second one", () => {
    const found = measure([pass([0, 0], 0, 100, 0), pass([0, 97], 0, 100, 45)]);
    expect(Math.abs(areaOf(found, "other") - 30)).toBeLessThan(4);
    expect(areaOf(found, "headland") + areaOf(found, "point-row")).toBe(0);
  });
});

describe("skips", () => {
  it("counts pieces and tells the largest: 2 x 100 m and, elsewhere, 1 x 100 m", () => {
    const passes = [pass([0, 0], 0, 100, 0), pass([12, 100], 180, 100, 100), pass([23, 0], 0, 100, 200)];
    const { skips, skippedM2 } = measure(passes);
    expect(skips.count).toBe(2);
    // The grid stands aslant, so a gap's open ends lose a triangle of some square metres.
    expect(Math.abs(skips.largestM2 - 200)).toBeLessThan(9);
    expect(Math.abs(skips.areaM2 - 300)).toBeLessThan(12);
    expect(skippedM2).toBeGreaterThanOrEqual(skips.areaM2);
  });

  it("has none where passes join", () => {
    expect(measure(FIELD).skips).toEqual({ count: 0, areaM2: 0, largestM2: 0 });
  });
});

describe("sections switched off", () => {
  it("does not sweep a row after it went silent to the end of its pass: 10 rows x 0.25 m x 50 m less", () => {
    const found = measure([pass([0, 0], 0, 100, 0)], (record, row) => (row > 30 && record >= 100 ? NaN : 900));
    expect(found.sweptM2).toBeCloseTo(1000 - 125, 1);
    expect(Math.abs(found.coveredM2 - 875)).toBeLessThan(2);
  });

  it("leaves the ground of a section off for 10 m as skipped, for the passes beside it", () => {
    const off = (record: number, row: number) => row > 20 && record >= 280 && record < 300;
    const passes = [pass([0, 0], 0, 100, 0), pass([10, 100], 180, 100, 100), pass([20, 0], 0, 100, 200)];
    const { skips } = measure(passes, (record, row) => (off(record, row) ? NaN : 900));
    expect(skips.count).toBe(1);
    expect(Math.abs(skips.areaM2 - 50)).toBeLessThan(3);
  });

  it("takes single missing readings, and a sensor dead all pass, for worked", () => {
    const missing = (record: number, row: number) => row === 7 || (record % 9 === 0 && row === 12);
    const found = measure([pass([0, 0], 0, 100, 0)], (record, row) => (missing(record, row) ? NaN : 900));
    // Row 12 is silent in the pass's first record, 0.5 m: that may be a section not yet on.
    expect(found.sweptM2).toBeCloseTo(1000 - 0.125, 2);
  });
});
