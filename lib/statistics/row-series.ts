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
  const members = recordsInPasses(placed);
  const into = emptySeries(members.length * Math.min(ROWS_AT_ONCE, channel.rows));
  for (let first = 0; first < channel.rows; first += ROWS_AT_ONCE) {
    const count = Math.min(ROWS_AT_ONCE, channel.rows - first);
    const gathered = gather(placed, channel, distances, { first, count, members, into });
    gathered.forEach((series, k) => made.push(use(series, first + k + 1)));
  }
  return made;
}

/** The series of row index `row` (from 0) alone. */
// kernel: a thin front of the hot loop below
export function rowSeries(placed: PlacedLog, channel: Readings, distances: Float32Array, row: number): RowSeries {
  const members = recordsInPasses(placed);
  return gather(placed, channel, distances, { first: row, count: 1, members, into: emptySeries(members.length) })[0]!;
}

function recordsInPasses({ passOf }: PlacedLog): Int32Array {
  const members = new Int32Array(passOf.length);
  let n = 0;
  for (let record = 0; record < passOf.length; record++) if (passOf[record] !== 0) members[n++] = record;
  return members.subarray(0, n);
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

interface Gathering {
  first: number;
  count: number;
  /** Records in passes. */
  members: Int32Array;
  into: RowSeries;
}

// kernel: hot loop over every reading
function gather(placed: PlacedLog, channel: Readings, distances: Float32Array, gathering: Gathering): RowSeries[] {
  const { first, count, members, into } = gathering;
  const { length } = members;
  const machineRows = placed.geometry.rows;
  // A channel of the whole machine is weighed by the middle row's distance.
  const ofRow = channel.rows === machineRows ? 1 : 0;
  const weightRow = ofRow === 1 ? first : machineRows >> 1;
  const { values, weightsM } = into;
  const readings = channel.values;
  let missing = 0;
  for (let i = 0; i < length; i++) {
    const record = members[i]!;
    const from = record * channel.rows + first;
    const weightFrom = record * machineRows + weightRow;
    for (let k = 0, at = i; k < count; k++, at += length) {
      const value = readings[from + k]!;
      values[at] = value;
      weightsM[at] = distances[weightFrom + ofRow * k]!;
      missing += +(value !== value);
    }
  }
  return Array.from({ length: count }, (_, k) =>
    missing === 0
      ? { ...partOf(into, k * length, (k + 1) * length), records: members }
      : dropMissing(partOf(into, k * length, (k + 1) * length), members),
  );
}

/** Closes the gaps of missing readings, in place. */
// kernel: hot loop over every reading
function dropMissing(series: RowSeries, members: Int32Array): RowSeries {
  const { values, weightsM, records } = series;
  let n = 0;
  for (let i = 0; i < members.length; i++) {
    const value = values[i]!;
    if (value !== value) continue;
    values[n] = value;
    weightsM[n] = weightsM[i]!;
    records[n++] = members[i]!;
  }
  return partOf(series, 0, n);
}

/** A row's series with each reading less the median of the other rows' at the same record; readings without others are left out. */
// kernel: hot loop over every reading
export function deviationSeries(
  series: RowSeries,
  middles: MiddleReadings,
  into: RowSeries = emptySeries(series.values.length),
): RowSeries {
  const { values, weightsM, records } = series;
  const { values: deviations, weightsM: weights, records: members } = into;
  let size = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    const record = records[i]!;
    const deviation = value - medianOfOthers(middles, record, value);
    deviations[size] = deviation;
    weights[size] = weightsM[i]!;
    members[size] = record;
    size += +(deviation === deviation);
  }
  return partOf(into, 0, size);
}
