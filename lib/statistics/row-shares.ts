import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { RowSeries } from "@/lib/statistics/row-series";

/** Share of a series' distance for which `holds`; null without distance. */
export function distanceShare(series: RowSeries, holds: (value: number) => boolean): number | null {
  let held = 0;
  let total = 0;
  for (let i = 0; i < series.values.length; i++) {
    const weight = series.weightsM[i]!;
    total += weight;
    if (holds(series.values[i]!)) held += weight;
  }
  return total > 0 ? held / total : null;
}

/** The margin below which a row is under target: target less deadband; null where the channel or machine has none. */
export function underTargetBelowN(placed: PlacedLog, channel: Pick<ResolvedChannel, "id" | "unit">): number | null {
  const target = placed.machine?.targetMarginN;
  if (channel.id !== "margin" || channel.unit !== "N" || target === undefined) return null;
  return target - (placed.machine?.marginDeadbandN ?? 0);
}

/** The force from which a row is at its limit: limit less the larger of 1 % of it and the log's own rounding; or null. */
export function atLimitFromN(
  placed: PlacedLog,
  channel: Pick<ResolvedChannel, "id" | "unit" | "resolution">,
): number | null {
  const limit = placed.machine?.maxDownforceN;
  if (channel.id !== "downforce" || channel.unit !== "N" || limit === undefined) return null;
  return limit - Math.max(0.01 * limit, channel.resolution ?? 0);
}

/**
 * Share of distance without ground contact: margin <= 0, or what a contact channel (0..1, or yes/no) leaves to 1, averaged
 * over distance. Null for any other channel.
 */
export function contactLostShare(series: RowSeries, channel: Pick<ResolvedChannel, "id" | "unit">): number | null {
  if (channel.id === "margin" && channel.unit === "N") return distanceShare(series, (value) => value <= 0);
  if (channel.id !== "contact" || (channel.unit !== "fraction" && channel.unit !== "boolean")) return null;
  let lost = 0;
  let total = 0;
  for (let i = 0; i < series.values.length; i++) {
    lost += series.weightsM[i]! * (1 - series.values[i]!);
    total += series.weightsM[i]!;
  }
  return total > 0 ? lost / total : null;
}

/** A stretch of consecutive readings of one row in one pass. */
export interface Stretch {
  lengthM: number;
  firstRecord: number;
  lastRecord: number;
}

/** The longest stretch of consecutive readings for which `holds`; a missing reading or the end of a pass ends a stretch. Null without any. */
export function longestStretch(
  placed: PlacedLog,
  { values, weightsM, records }: RowSeries,
  holds: (value: number) => boolean,
): Stretch | null {
  const { passOf } = placed;
  const longest = { lengthM: -1, firstRecord: 0, lastRecord: 0 };
  let lengthM = 0;
  let first = 0;
  let last = -2;
  let isLongest = false;
  for (let i = 0; i < values.length; i++) {
    if (!holds(values[i]!)) {
      last = -2;
      continue;
    }
    const record = records[i]!;
    if (record !== last + 1 || passOf[record] !== passOf[last]) {
      lengthM = 0;
      first = record;
      isLongest = false;
    }
    lengthM += weightsM[i]!;
    last = record;
    isLongest ||= lengthM > longest.lengthM;
    if (!isLongest) continue;
    longest.lengthM = lengthM;
    longest.firstRecord = first;
    longest.lastRecord = last;
  }
  return longest.lengthM < 0 ? null : longest;
}

/**
 * Length of the longest such stretch below `below` of every row, in one walk over a channel with a reading a row of the machine;
 * 0 for a row without any.
 */
// kernel: hot loop over every reading
export function longestBelowM(
  { passOf }: Pick<PlacedLog, "passOf">,
  { values, rows }: Pick<ResolvedChannel, "values" | "rows">,
  distances: Float32Array,
  below: number,
): Float64Array {
  const longest = new Float64Array(rows);
  const open = new Float64Array(rows);
  const last = new Int32Array(rows).fill(-2);
  for (let record = 0; record < passOf.length; record++) {
    const pass = passOf[record]!;
    if (pass === 0) continue;
    const before = passOf[record - 1] === pass ? record - 1 : -1;
    const from = record * rows;
    for (let row = 0; row < rows; row++) {
      if (!(values[from + row]! < below)) continue;
      const lengthM = (last[row] === before ? open[row]! : 0) + distances[from + row]!;
      open[row] = lengthM;
      last[row] = record;
      if (lengthM > longest[row]!) longest[row] = lengthM;
    }
  }
  return longest;
}
