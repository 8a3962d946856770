import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { passMembers } from "@/lib/cleaning/rule-mask";

/** A placed log, one of its channels, and the distances of `rowDistances`. */
export interface ChannelOnGround {
  placed: PlacedLog;
  channel: ResolvedChannel;
  distances: Float32Array;
}

/** Calls `take` for every finite reading of a pass with the distance its row travelled; a channel of the whole machine takes the middle row's. */
export function eachReading(
  { placed, channel, distances }: ChannelOnGround,
  pass: Pass,
  take: (value: number, weightM: number, record: number, row: number) => void,
): void {
  const machineRows = placed.geometry.rows;
  for (const record of passMembers(placed, pass)) {
    for (let row = 0; row < channel.rows; row++) {
      const value = channel.values[record * channel.rows + row]!;
      if (!Number.isFinite(value)) continue;
      const weightRow = channel.rows === machineRows ? row : machineRows >> 1;
      take(value, distances[record * machineRows + weightRow]!, record, row);
    }
  }
}

/** All readings of a pass with their weights, for quantiles and shares. */
export function gatherPass(from: ChannelOnGround, pass: Pass) {
  const room = pass.records * from.channel.rows;
  const values = new Float32Array(room);
  const weightsM = new Float32Array(room);
  const records = new Int32Array(room);
  let n = 0;
  eachReading(from, pass, (value, weightM, record) => {
    values[n] = value;
    weightsM[n] = weightM;
    records[n++] = record;
  });
  return { values: values.subarray(0, n), weightsM: weightsM.subarray(0, n), records: records.subarray(0, n) };
}
