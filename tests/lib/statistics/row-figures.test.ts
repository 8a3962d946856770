import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { resolveChannel } from "@/lib/channels/resolve-channel";
import { rowDistances } from "@/lib/rows/row-distances";
import { middleReadings } from "@/lib/statistics/middle-readings";
import { rowFigures, type RowFigures } from "@/lib/statistics/row-figures";
import { mapRowTallies } from "@/lib/statistics/tally-rows";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

const ROWS = 11;
const RECORDS = 90;
const machine = { ...makeSeeder(), rowCount: ROWS, targetMarginN: 300, marginDeadbandN: 20, maxDownforceN: 1200 };

/** Single precision blurs such steps by some millionths. Readings in steps of the log's own rounding, some missing, some far off. */
const readings = fc.record({
  step: fc.constantFrom(1, 0.5, 10, 4.4482216152605),
  cells: fc.array(
    fc.oneof(
      { weight: 8, arbitrary: fc.integer({ min: -20, max: 90 }) },
      { weight: 1, arbitrary: fc.constant(NaN) },
      { weight: 1, arbitrary: fc.integer({ min: -400, max: 900 }) },
    ),
    { minLength: ROWS * RECORDS, maxLength: ROWS * RECORDS },
  ),
});

interface Both {
  /** Rows that have a tally. */
  tallied: number;
  tally: RowFigures[];
  series: RowFigures[];
}

function figures(id: "margin" | "downforce", step: number, cells: readonly number[]): Both {
  const made = makeLog({
    rows: ROWS,
    records: straightTrack({ from: [0, 0], headingDeg: 20, records: RECORDS }),
    channels: [{ id, value: (record, row) => Math.fround(cells[record * ROWS + row - 1]! * step) }],
  });
  const built = buildLog(made, machine);
  if (!built.ok) throw new Error(built.error.message);
  const { placed } = built.value;
  const channel = resolveChannel(placed, id)!;
  const distances = rowDistances(placed);
  const middles = middleReadings(channel.values, channel.rows);
  const stepped = { ...channel, resolution: step };
  return {
    tallied: mapRowTallies(placed, stepped, { distances, middles }, () => null)?.length ?? 0,
    tally: rowFigures(placed, stepped, { distances, middles }),
    // Without a step there is no tally.
    series: rowFigures(placed, { ...channel, resolution: null }, { distances, middles }),
  };
}

function expectAlike(tally: RowFigures, series: RowFigures): void {
  for (const [name, value] of Object.entries(series)) {
    const found = tally[name as keyof RowFigures];
    const pairs = Array.isArray(value) ? value.map((one, k) => [(found as number[])[k], one]) : [[found, value]];
    for (const [ours, theirs] of pairs) {
      if (theirs === null || Number.isNaN(theirs)) expect(ours, name).toEqual(theirs);
      else expect(ours, name).toBeCloseTo(theirs as number, 4);
    }
  }
}

describe("rowFigures", () => {
  it.each(["margin", "downforce"] as const)("tells the same of %s from tallies as from the series", (id) => {
    fc.assert(
      fc.property(readings, ({ step, cells }) => {
        const { tallied, tally, series } = figures(id, step, cells);
        expect(tallied).toBe(ROWS);
        series.forEach((one, row) => expectAlike(tally[row]!, one));
      }),
      { seed: 3, numRuns: 60, endOnFailure: true },
    );
  });

  it("has no tally of readings that are no multiples of the resolution", () => {
    const cells = Array.from({ length: ROWS * RECORDS }, (_, i) => ((i * 37) % 100) / 7);
    const { tallied, tally, series } = figures("margin", 1, cells);
    expect(tallied).toBe(0);
    expect(tally).toEqual(series);
  });
});
