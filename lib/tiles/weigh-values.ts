import { extent } from "d3-array";
import type { ValueDistribution } from "@/lib/legend/value-distribution";
import type { LogChannel } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { mapRowSeries } from "@/lib/statistics/row-series";
import { scaleBetween } from "@/lib/tiles/value-scale";

const GREATEST_CODE = 65_535;

/**
 * Weighs every reading made in a pass by the distance its row travelled, as all statistics do. The log's own rounding is
 * divided as finely as 65,535 codes allow, so that values logged in steps keep a code each and none is moved to another.
 */
export function weighValues(
  placed: PlacedLog,
  channel: Pick<LogChannel, "values" | "rows" | "resolution">,
): ValueDistribution {
  const distances = rowDistances(placed);
  const ranges = mapRowSeries(placed, channel, distances, ({ values }) => extent(values));
  const [low = 0, high = 0] = extent(ranges.flatMap(([from, to]) => (from === undefined ? [] : [from, to])));
  const { step: coarse } = scaleBetween(low, high, channel.resolution);
  const step = coarse / Math.max(1, Math.floor(((GREATEST_CODE - 1) * coarse) / (high - low || coarse)));
  const metres = new Float64Array(GREATEST_CODE + 2);
  mapRowSeries(placed, channel, distances, ({ values, weightsM }) => {
    for (let i = 0; i < values.length; i += 1) {
      const code = Math.round((values[i]! - low) / step);
      if (code >= 0 && code <= GREATEST_CODE) metres[code]! += weightsM[i]!;
    }
  });
  const codes = Array.from(metres.keys()).filter((code) => metres[code]! > 0);
  return { offset: low, step, codes, distancesM: codes.map((code) => Number(metres[code]!.toPrecision(6))) };
}
