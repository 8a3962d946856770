// Hand-worked: six rows, a record every half metre and fifth of a second.
import { describe, expect, it } from "vitest";
import type { LogChannel } from "@/lib/logs/machine-log";
import { straightTrack, type MadeLog } from "@/tests/support/make-log";
import { makePlaced, maskOf, taken } from "@/tests/lib/cleaning/make-placed";

const ROWS = 6;
type Value = (record: number, row: number) => number;

function placedWith(value: Value, channel: Partial<LogChannel> = {}, records = 60) {
  const made: MadeLog = {
    records: straightTrack({ from: [0, 0], headingDeg: 0, records }),
    rows: ROWS,
    channels: [{ id: channel.id ?? "margin", unit: channel.unit, resolution: channel.resolution ?? 1, value }],
  };
  return makePlaced(made);
}

/** Whole newtons that differ from row to row and record to record, the same every time. */
const lively: Value = (record, row) => 400 + ((record * 7 + row * 13) % 23);
/** Records of one row (from 1) that a channel's mask takes out. */
const ofRow = (marks: Uint8Array | undefined, row: number) =>
  taken(marks).flatMap((at) => (at % ROWS === row - 1 ? [Math.floor(at / ROWS)] : []));
const rowsHit = (marks: Uint8Array | undefined) => [...new Set(taken(marks).map((at) => (at % ROWS) + 1))];

describe("a stuck sensor", () => {
  const stuck = (from: number, records: number, value = 411) =>
    placedWith((record, row) => (row === 3 && record >= from && record < from + records ? value : lively(record, row)));

  it("is one unchanged for more than 20 records while the others change", () => {
    const marks = maskOf(stuck(15, 21), "sensor-stuck").channels!.get("margin");
    expect(rowsHit(marks)).toEqual([3]);
    const out = ofRow(marks, 3);
    // Its neighbours in time may happen to have the value, too.
    expect(out.length).toBeGreaterThanOrEqual(21);
    expect(out).toEqual(expect.arrayContaining(Array.from({ length: 21 }, (_, k) => 15 + k)));
  });

  it("is none after 20, nor with a larger number", () => {
    // Row 5 reads more than row 3 once, so that row 3 does not stand at the end of the channel's range.
    const still = placedWith((record, row) => {
      if (row === 3 && record >= 15 && record < 35) return 509;
      return row === 5 && record === 3 ? 700 : lively(record, row);
    });
    expect(taken(maskOf(still, "sensor-stuck").channels!.get("margin"))).toEqual([]);
    expect(taken(maskOf(stuck(15, 21), "sensor-stuck", { unchangedRecords: 25 }).channels!.get("margin"))).toEqual([]);
  });

  it("is none where all rows stand still together", () => {
    const still = placedWith((record, row) => (record >= 15 && record < 45 ? 400 + row : lively(record, row)));
    expect(taken(maskOf(still, "sensor-stuck").channels!.get("margin"))).toEqual([]);
  });

  it("is none at the end of its range: off the ground at 0, or at full force", () => {
    const lifted = placedWith((record, row) => (row === 2 && record >= 10 && record < 40 ? 0 : lively(record, row)));
    expect(taken(maskOf(lifted, "sensor-stuck").channels!.get("margin"))).toEqual([]);
  });

  it("is a row that never read anything else, even at the end of its range", () => {
    const dead = placedWith((record, row) => (row === 2 ? 0 : lively(record, row)));
    const marks = maskOf(dead, "sensor-stuck").channels!.get("margin");
    expect(rowsHit(marks)).toEqual([2]);
    expect(ofRow(marks, 2)).toHaveLength(60);
  });

  it("starts anew in each pass", () => {
    const made: MadeLog = {
      records: [
        ...straightTrack({ from: [0, 0], headingDeg: 0, records: 25 }),
        ...straightTrack({ from: [20, 12], headingDeg: 180, records: 25, startS: 60 }),
      ],
      rows: ROWS,
      channels: [
        {
          id: "margin",
          value: (record, row) => (row === 3 && record >= 12 && record < 37 ? 411 : lively(record, row)),
        },
      ],
    };
    expect(taken(maskOf(makePlaced(made), "sensor-stuck").channels!.get("margin"))).toEqual([]);
  });
});

describe("what a channel cannot be", () => {
  it("goes, at either end, in the unit that the numbers are in", () => {
    const placed = placedWith((record, row) => (record === 9 && row === 2 ? 9000 : record === 11 ? -600 : 400));
    const numbers = { marginMinN: -500, marginMaxN: 6000 };
    const marks = maskOf(placed, "physical-range", numbers).channels!.get("margin");
    expect(ofRow(marks, 2)).toEqual([9, 11]);
    expect(ofRow(marks, 1)).toEqual([11]);
  });

  it("has no bounds for a pressure or a channel of one's own", () => {
    const pressure = placedWith(() => 9e6, { unit: "Pa" });
    expect(maskOf(pressure, "physical-range").channels!.size).toBe(0);
    const own = placedWith(() => 9e6, { id: "other:valve" });
    expect(maskOf(own, "physical-range").channels!.size).toBe(0);
  });
});

describe("a reading that stands alone", () => {
  const marksOf = (value: Value, channel: Partial<LogChannel> = {}) =>
    maskOf(placedWith(value, channel), "local-outlier").channels?.get(channel.id ?? "margin");

  it("is far off its row close by and off the other rows at that moment", () => {
    const marks = marksOf((record, row) => (record === 30 && row === 4 ? 1400 : lively(record, row)));
    expect(taken(marks)).toEqual([30 * ROWS + 3]);
  });

  it("is none where all rows go up together, as over a hard spot", () => {
    expect(taken(marksOf((record, row) => lively(record, row) + (record === 30 ? 1000 : 0)))).toEqual([]);
  });

  it("is none in a row that is always off the others", () => {
    expect(taken(marksOf((record, row) => lively(record, row) + (row === 4 ? 1000 : 0)))).toEqual([]);
  });

  it("is none within one step of the log's own rounding", () => {
    expect(taken(marksOf((record, row) => (record === 30 && row === 4 ? 401 : 400)))).toEqual([]);
    // Beyond five steps of a channel that hardly ever moves it is one.
    expect(taken(marksOf((record, row) => (record === 30 && row === 4 ? 406 : 400)))).toEqual([30 * ROWS + 3]);
  });

  it("is not looked for in ground contact: to lose it is the very event", () => {
    expect(marksOf((record, row) => (record === 30 && row === 4 ? 0 : 1), { id: "contact", unit: "fraction" })).toBe(
      undefined,
    );
  });

  it("follows its numbers", () => {
    const placed = placedWith((record, row) => (record === 30 && row === 4 ? 480 : lively(record, row)));
    const out = (maxSpreads: number) => taken(maskOf(placed, "local-outlier", { maxSpreads }).channels!.get("margin"));
    expect(out(5)).toEqual([30 * ROWS + 3]);
    expect(out(20)).toEqual([]);
  });
});

describe("ground worked before", () => {
  /** Four rows of 0.25 m up the field, and down again `shiftM` further east, `pauseS` seconds later. */
  const both = (shiftM: number, pauseS: number, records = 60) => {
    const up = straightTrack({ from: [0, 0], headingDeg: 0, records });
    const startS = up.at(-1)!.timeS! + pauseS;
    const down = straightTrack({ from: [shiftM, (records - 1) / 2], headingDeg: 180, records, startS });
    return makePlaced({ records: [...up, ...down], channels: [{ id: "margin", value: () => 400 }] });
  };

  it("is that of the one row which overlaps by its width: 0.75 m apart with rows of 0.25 m", () => {
    const { cells } = maskOf(both(0.75, 30), "overlap");
    const out = taken(cells);
    // Going down, row 4 is the western one; the first record reaches back past the end of the first pass.
    expect(new Set(out.map((at) => at % 4))).toEqual(new Set([3]));
    const records = out.map((at) => Math.floor(at / 4));
    expect(records[0]).toBeLessThanOrEqual(61);
    expect(records.at(-1)).toBe(119);
    expect(out.length).toBeGreaterThanOrEqual(59);
  });

  it("is none where 40 % of a row overlaps, and all where everything does", () => {
    expect(taken(maskOf(both(0.9, 30), "overlap").cells)).toEqual([]);
    const { cells } = maskOf(both(0, 30), "overlap");
    expect(taken(cells).length).toBeGreaterThanOrEqual(59 * 4);
    expect(taken(cells).every((at) => at >= 60 * 4)).toBe(true);
  });

  it("is none within the time that a turn takes", () => {
    expect(taken(maskOf(both(0, 8), "overlap").cells)).toEqual([]);
    expect(taken(maskOf(both(0, 8), "overlap", { minApartS: 5 }).cells).length).toBeGreaterThan(200);
  });
});
