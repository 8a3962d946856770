import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { deviationFromOthers } from "@/lib/statistics/row-deviation";
import { middleReadings } from "@/lib/statistics/middle-readings";
import { deviationSeries, mapRowSeries, rowSeries } from "@/lib/statistics/row-series";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

/** More rows than are gathered at once, with readings missing here and there. */
const ROWS = 19;

function place() {
  const records = straightTrack({ from: [0, 0], headingDeg: 20, records: 40 });
  const value = (i: number, row: number) => ((i * 7 + row * 3) % 11 === 0 ? NaN : (i * 13 + row * row) % 50);
  const built = buildLog(
    makeLog({ rows: ROWS, records, channels: [{ id: "margin", value }] }),
    makeSeeder({ rowCount: ROWS }),
  );
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

describe("series of rows", () => {
  const placed = place();
  const channel = placed.log.channels[0]!;
  const distances = rowDistances(placed);

  it("are the same gathered together as one by one", () => {
    const together = mapRowSeries(placed, channel, distances, (series, row) => ({
      row,
      values: Array.from(series.values),
      weightsM: Array.from(series.weightsM),
      records: Array.from(series.records),
    }));
    expect(together).toHaveLength(ROWS);
    together.forEach((series, k) => {
      const alone = rowSeries(placed, channel, distances, k);
      expect(series.row).toBe(k + 1);
      expect(series.values).toEqual(Array.from(alone.values));
      expect(series.weightsM).toEqual(Array.from(alone.weightsM));
      expect(series.records).toEqual(Array.from(alone.records));
      expect(series.values.length).toBeLessThan(placed.log.records);
    });
  });

  it("of deviations hold what the whole channel of deviations holds", () => {
    const middles = middleReadings(channel.values, channel.rows);
    const whole = { rows: channel.rows, values: deviationFromOthers(channel.values, channel.rows) };
    for (let row = 0; row < ROWS; row++) {
      const found = deviationSeries(rowSeries(placed, channel, distances, row), middles);
      expect(Array.from(found.values)).toEqual(Array.from(rowSeries(placed, whole, distances, row).values));
    }
  });
});
