import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { passSteps, type PassStep } from "@/lib/rows/pass-members";

/** The readings of one row over one pass, in order; NaN where the row has none. */
export interface RowTrack {
  pass: Pass;
  row: number;
  steps: PassStep[];
  values: Float64Array;
  lengthsM: Float64Array;
}

/** Tracks of every row of a pass. */
export function rowTracks(
  placed: PlacedLog,
  channel: ResolvedChannel,
  distances: Float32Array,
  pass: Pass,
): RowTrack[] {
  const steps = passSteps(placed, pass).filter((step) => step.before >= 0 || step.after >= 0);
  const machineRows = placed.geometry.rows;
  return Array.from({ length: channel.perRow ? channel.rows : 0 }, (_, row) => ({
    pass,
    row: row + 1,
    steps,
    values: Float64Array.from(steps, (step) => channel.values[step.record * channel.rows + row]!),
    lengthsM: Float64Array.from(steps, (step) => distances[step.record * machineRows + row]!),
  }));
}
