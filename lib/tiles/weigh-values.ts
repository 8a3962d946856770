import type { ValueDistribution } from "@/lib/legend/value-distribution";
import type { LogChannel } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { allRowSeries } from "@/lib/statistics/row-series";
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
  const series = allRowSeries(placed, channel, rowDistances(placed));
  const [low, high] = rangeOf(series.map(({ values }) => values));
  const { step: coarse } = scaleBetween(low, high, channel.resolution);
  const step = coarse / Math.max(1, Math.floor(((GREATEST_CODE - 1) * coarse) / (high - low || coarse)));
  const metres = new Float64Array(GREATEST_CODE + 2);
  for (const { values, weightsM } of series) {
    for (let i = 0; i < values.length; i += 1) {
      const code = Math.round((values[i]! - low) / step);
      if (code >= 0 && code <= GREATEST_CODE) metres[code]! += weightsM[i]!;
    }
  }
  const codes = Array.from(metres.keys()).filter((code) => metres[code]! > 0);
  return { offset: low, step, codes, distancesM: codes.map((code) => Number(metres[code]!.toPrecision(6))) };
}

function rangeOf(lists: readonly Float32Array[]): [low: number, high: number] {
  let low = Infinity;
  let high = -Infinity;
  for (const values of lists) {
    for (const value of values) {
      if (value < low && value > -Infinity) low = value;
      if (value > high && value < Infinity) high = value;
    }
  }
  return low <= high ? [low, high] : [0, 0];
}
