import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { medianOfOthers, type MiddleReadings } from "@/lib/statistics/middle-readings";

/** Finite readings of one row in passes, in the file's order, with the distance each stands for. */
export interface RowSeries {
  values: Float32Array;
  weightsM: Float32Array;
  records: Int32Array;
}

/** Anything laid out like a channel. */
type Readings = Pick<ResolvedChannel, "values" | "rows">;

/** Rows gathered in one walk through memory: neighbours share its cache lines. */
const ROWS_AT_ONCE = 8;

/** What `use` makes of the series of every row, row 1 first. The series is overwritten by later ones: `use` keeps none of it. */
export function mapRowSeries<T>(
  placed: PlacedLog,
  channel: Readings,
  distances: Float32Array,
  use: (series: RowSeries, row: number) => T,
): T[] {
  const made: T[] = [];
  const into = emptySeries(placed.log.records * Math.min(ROWS_AT_ONCE, channel.rows));
  for (let first = 0; first < channel.rows; first += ROWS_AT_ONCE) {
    const count = Math.min(ROWS_AT_ONCE, channel.rows - first);
    const gathered = gather(placed, channel, distances, { first, count, into });
    gathered.forEach((series, k) => made.push(use(series, first + k + 1)));
  }
  return made;
}

/** The series of row index `row` (from 0) alone. */
// kernel: a thin front of the hot loop below
export function rowSeries(placed: PlacedLog, channel: Readings, distances: Float32Array, row: number): RowSeries {
  const into = emptySeries(placed.log.records);
  return gather(placed, channel, distances, { first: row, count: 1, into })[0]!;
}

/** Room for a series of at most `length` readings. */
export function emptySeries(length: number): RowSeries {
  return { values: new Float32Array(length), weightsM: new Float32Array(length), records: new Int32Array(length) };
}

/** Part of a series, without a copy. */
function partOf({ values, weightsM, records }: RowSeries, from: number, end: number): RowSeries {
  return {
    values: values.subarray(from, end),
    weightsM: weightsM.subarray(from, end),
    records: records.subarray(from, end),
  };
}

// kernel: hot loop over every reading
function gather(
  placed: PlacedLog,
  channel: Readings,
  distances: Float32Array,
  { first, count, into }: { first: number; count: number; into: RowSeries },
): RowSeries[] {
  const { records } = placed.log;
  const machineRows = placed.geometry.rows;
  // A channel of the whole machine is weighed by the middle row's distance.
  const ofRow = channel.rows === machineRows ? 1 : 0;
  const weightRow = ofRow === 1 ? first : machineRows >> 1;
  const { values, weightsM, records: members } = into;
  const ends = Uint32Array.from({ length: count }, (_, k) => k * records);
  for (let record = 0; record < records; record++) {
    if (placed.passOf[record] === 0) continue;
    const from = record * channel.rows + first;
    const weightFrom = record * machineRows + weightRow;
    for (let k = 0; k < count; k++) {
      const value = channel.values[from + k]!;
      if (value !== value) continue;
      const at = ends[k]!++;
      values[at] = value;
      weightsM[at] = distances[weightFrom + ofRow * k]!;
      members[at] = record;
    }
  }
  return Array.from(ends, (end, k) => partOf(into, k * records, end));
}

/** A row's series with each reading less the median of the other rows' at the same record; readings without others are left out. */
export function deviationSeries(
  series: RowSeries,
  middles: MiddleReadings,
  into: RowSeries = emptySeries(series.values.length),
): RowSeries {
  let size = 0;
  for (let i = 0; i < series.values.length; i++) {
    const value = series.values[i]!;
    const deviation = value - medianOfOthers(middles, series.records[i]!, value);
    if (deviation !== deviation) continue;
    into.values[size] = deviation;
    into.weightsM[size] = series.weightsM[i]!;
    into.records[size++] = series.records[i]!;
  }
  return partOf(into, 0, size);
}
