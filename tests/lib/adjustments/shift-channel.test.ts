// Hand-worked: a record every 0.2 s; the reading of record i is i, so that a shift shows as a number of records.
import { describe, expect, it } from "vitest";
import { shiftChannel } from "@/lib/adjustments/shift-channel";
import { makePlaced } from "@/tests/lib/cleaning/make-placed";
import { straightTrack } from "@/tests/support/make-log";

const channels = [{ id: "margin" as const, value: (record: number, row: number) => record + row / 10 }];
const two = makePlaced({
  records: [
    ...straightTrack({ from: [0, 0], headingDeg: 0, records: 10 }),
    ...straightTrack({ from: [20, 4.5], headingDeg: 180, records: 10, startS: 60 }),
  ],
  channels,
});
const margin = two.log.channels[0]!;
/** Readings of row 1 as whole records; null where there is none. */
const shifted = (delayS: number) =>
  Array.from({ length: 20 }, (_, i) => {
    const value = shiftChannel(two, margin, delayS).values[i * 4]!;
    return Number.isNaN(value) ? null : Math.floor(value);
  });
const run = (from: number, end: number) => Array.from({ length: end - from }, (_, k) => from + k);
const none = (count: number) => new Array<null>(count).fill(null);

describe("a channel that was logged late", () => {
  it("is read from the records that came so much later, in the same pass only", () => {
    expect(shifted(0.6)).toEqual([...run(3, 10), ...none(3), ...run(13, 20), ...none(3)]);
  });

  it("and the other way for one logged early", () => {
    expect(shifted(-0.4)).toEqual([...none(2), ...run(0, 8), ...none(2), ...run(10, 18)]);
  });

  it("takes the nearest record, the earlier of two as near, and mixes none", () => {
    expect(shifted(0.26)).toEqual([...run(1, 10), null, ...run(11, 20), null]);
    expect(shifted(0.34)).toEqual([...run(2, 10), ...none(2), ...run(12, 20), ...none(2)]);
  });

  it("moves all rows alike and leaves what was logged alone", () => {
    const before = Float32Array.from(margin.values);
    const { values } = shiftChannel(two, margin, 0.2);
    expect([...values.subarray(0, 4)]).toEqual([...margin.values.subarray(4, 8)]);
    expect(margin.values).toEqual(before);
    expect(shiftChannel(two, margin, 0)).toBe(margin);
  });

  it("is missing where records have no time", () => {
    const timeless = { ...two, log: { ...two.log, timeMs: new Float64Array(20).fill(NaN) } };
    expect([...shiftChannel(timeless, margin, 0.2).values].every(Number.isNaN)).toBe(true);
  });
});
