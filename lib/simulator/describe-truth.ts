import type { LogChannel } from "@/lib/logs/machine-log";
import type { Track } from "@/lib/simulator/drive-path-records";
import type { RowLayout } from "@/lib/simulator/row-layout";
import type { ChannelTruth, PassTruth, RowTruth } from "@/lib/simulator/simulation-truth";

/** Runs of records of one pass. */
export function listPasses(track: Track): PassTruth[] {
  const passes: PassTruth[] = [];
  for (let record = 0; record < track.records; record += 1) {
    const pass = track.pass[record] ?? 0;
    if (pass === 0) continue;
    const open = passes.at(-1);
    if (open?.pass === pass) {
      open.records += 1;
      open.lengthM += stepM(track, record);
    } else {
      const headingDeg = ((((track.headingRad[record] ?? 0) * 180) / Math.PI) % 360) + 0;
      passes.push({ pass, firstRecord: record, records: 1, headingDeg: (headingDeg + 360) % 360, lengthM: 0 });
    }
  }
  return passes;
}

function stepM(track: Track, record: number): number {
  return Math.hypot(
    (track.eastM[record] ?? 0) - (track.eastM[record - 1] ?? 0),
    (track.northM[record] ?? 0) - (track.northM[record - 1] ?? 0),
  );
}

/** Where a row stands at a record, in the plane. */
export function rowPlace(track: Track, layout: RowLayout, record: number, row: number): [number, number] {
  const heading = track.headingRad[record] ?? 0;
  const offsetM = layout.offsetM[row] ?? 0;
  const forwardM = layout.forwardM[row] ?? 0;
  return [
    (track.eastM[record] ?? 0) + forwardM * Math.sin(heading) + offsetM * Math.cos(heading),
    (track.northM[record] ?? 0) + forwardM * Math.cos(heading) - offsetM * Math.sin(heading),
  ];
}

/**
 * Weight of each reading: distance its row travelled since the record before in the same pass; the first of a pass takes
 * the distance to the next. 0 outside passes. Laid out like a channel.
 */
export function weighReadings(track: Track, layout: RowLayout, passes: readonly PassTruth[]): Float64Array {
  const weights = new Float64Array(track.records * layout.rows);
  for (const { firstRecord, records } of passes) {
    for (let row = 0; row < layout.rows; row += 1) {
      let [eastM, northM] = rowPlace(track, layout, firstRecord, row);
      for (let record = firstRecord + 1; record < firstRecord + records; record += 1) {
        const [nextEastM, nextNorthM] = rowPlace(track, layout, record, row);
        weights[record * layout.rows + row] = Math.hypot(nextEastM - eastM, nextNorthM - northM);
        eastM = nextEastM;
        northM = nextNorthM;
      }
      if (records > 1) weights[firstRecord * layout.rows + row] = weights[(firstRecord + 1) * layout.rows + row] ?? 0;
    }
  }
  return weights;
}

/** Weighted facts of every row of a stored channel; two passes over the values, so nothing cancels. */
export function describeChannel(channel: LogChannel, weights: Float64Array): ChannelTruth {
  const rows = Array.from({ length: channel.rows }, (_, index) => describeRow(channel, weights, index));
  return { id: channel.id as ChannelTruth["id"], unit: channel.unit as ChannelTruth["unit"], rows };
}

function describeRow({ values, rows }: LogChannel, weights: Float64Array, rowIndex: number): RowTruth {
  const row: RowTruth = { row: rowIndex + 1, n: 0, distanceM: 0, mean: NaN, sd: NaN, min: Infinity, max: -Infinity };
  let sum = 0;
  forEachReading((value, weight) => {
    row.n += 1;
    row.distanceM += weight;
    row.min = Math.min(row.min, value);
    row.max = Math.max(row.max, value);
    sum += weight * value;
  });
  row.mean = sum / row.distanceM;
  let squares = 0;
  forEachReading((value, weight) => (squares += weight * (value - row.mean) ** 2));
  row.sd = Math.sqrt(squares / row.distanceM);
  return row;

  function forEachReading(visit: (value: number, weight: number) => void): void {
    for (let at = rowIndex; at < values.length; at += rows) {
      const value = values[at] ?? NaN;
      const weight = weights[at] ?? 0;
      if (weight > 0 && !Number.isNaN(value)) visit(value, weight);
    }
  }
}
