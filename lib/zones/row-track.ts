import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import type { PassStep } from "@/lib/rows/pass-members";

/** The readings of one row over one pass, in order; NaN where the row has none. */
export interface RowTrack {
  pass: Pass;
  row: number;
  values: Float64Array;
  lengthsM: Float64Array;
}

export interface TrackSource {
  placed: PlacedLog;
  channel: ResolvedChannel;
  distances: Float32Array;
}

/** Tracks of every row of a pass, one entry a step. */
export function rowTracks(
  { placed, channel, distances }: TrackSource,
  pass: Pass,
  steps: readonly PassStep[],
): RowTrack[] {
  const machineRows = placed.geometry.rows;
  const tracks = Array.from({ length: channel.rows }, (_, row) => ({
    pass,
    row: row + 1,
    values: new Float64Array(steps.length),
    lengthsM: new Float64Array(steps.length),
  }));
  steps.forEach((step, k) => {
    for (const track of tracks) {
      track.values[k] = channel.values[step.record * channel.rows + track.row - 1]!;
      track.lengthsM[k] = distances[step.record * machineRows + track.row - 1]!;
    }
  });
  return tracks;
}
