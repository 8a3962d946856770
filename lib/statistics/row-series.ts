import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";

/** Finite readings of one row in passes, in the file's order. */
export interface RowSeries {
  values: Float32Array;
  weightsM: Float32Array;
  records: Int32Array;
}

/** Readings of row index `row` (from 0) with the distance each stands for; `values` may be any array laid out like the channel. */
export function rowSeries(
  placed: PlacedLog,
  channel: Pick<ResolvedChannel, "values" | "rows">,
  distances: Float32Array,
  row: number,
): RowSeries {
  const { records } = placed.log;
  const values = new Float32Array(records);
  const weightsM = new Float32Array(records);
  const members = new Int32Array(records);
  const machineRows = placed.geometry.rows;
  const weightRow = channel.rows === machineRows ? row : machineRows >> 1;
  let n = 0;
  for (let record = 0; record < records; record++) {
    const value = channel.values[record * channel.rows + row]!;
    if (placed.passOf[record] === 0 || Number.isNaN(value)) continue;
    values[n] = value;
    weightsM[n] = distances[record * machineRows + weightRow]!;
    members[n] = record;
    n++;
  }
  return { values: values.subarray(0, n), weightsM: weightsM.subarray(0, n), records: members.subarray(0, n) };
}
