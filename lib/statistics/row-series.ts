import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";

/** Finite readings of one row in passes, in the file's order, with the distance each stands for. */
export interface RowSeries {
  values: Float32Array;
  weightsM: Float32Array;
  records: Int32Array;
}

/** Anything laid out like a channel. */
type Readings = Pick<ResolvedChannel, "values" | "rows">;

/** The series of every row, gathered in one walk through memory. */
export function allRowSeries(placed: PlacedLog, channel: Readings, distances: Float32Array): RowSeries[] {
  return gather(placed, channel, distances, { first: 0, count: channel.rows });
}

/** The series of row index `row` (from 0) alone. */
// kernel: a thin front of the hot loop below
export function rowSeries(placed: PlacedLog, channel: Readings, distances: Float32Array, row: number): RowSeries {
  return gather(placed, channel, distances, { first: row, count: 1 })[0]!;
}

// kernel: hot loop over every reading
function gather(
  placed: PlacedLog,
  channel: Readings,
  distances: Float32Array,
  { first, count }: { first: number; count: number },
): RowSeries[] {
  const { records } = placed.log;
  const machineRows = placed.geometry.rows;
  const values = new Float32Array(records * count);
  const weightsM = new Float32Array(records * count);
  const members = new Int32Array(records * count);
  const sizes = new Uint32Array(count);
  for (let record = 0; record < records; record++) {
    if (placed.passOf[record] === 0) continue;
    for (let k = 0; k < count; k++) {
      const value = channel.values[record * channel.rows + first + k]!;
      if (Number.isNaN(value)) continue;
      // A channel of the whole machine is weighed by the middle row's distance.
      const weightRow = channel.rows === machineRows ? first + k : machineRows >> 1;
      const at = k * records + sizes[k]!;
      values[at] = value;
      weightsM[at] = distances[record * machineRows + weightRow]!;
      members[at] = record;
      sizes[k]!++;
    }
  }
  return Array.from(sizes, (size, k) => ({
    values: values.subarray(k * records, k * records + size),
    weightsM: weightsM.subarray(k * records, k * records + size),
    records: members.subarray(k * records, k * records + size),
  }));
}
