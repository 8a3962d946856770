import type { Lane, LaneTrack } from "@/lib/alignment/lane-track";

/** Shares of the width beside a neighbour that are tried: near rows are most alike, many rows are least noisy. */
export const LANE_SHARES = [1, 1 / 3, 1 / 6] as const;

/** Fewer rows than this are no lane. */
const LEAST_ROWS = 2;

/** The lanes of a pass. A channel logged once for the machine has one, of the whole width. */
export function meanLanes(track: LaneTrack, offsetM: ArrayLike<number>, perRow: boolean): Lane[] {
  if (!perRow) return [{ share: 1, side: 0, offsetM: 0, values: track.readings }];
  const order = Array.from({ length: track.rows }, (_, row) => row).sort((a, b) => offsetM[a]! - offsetM[b]!);
  return LANE_SHARES.flatMap((share): Lane[] => {
    const count = Math.round(order.length * share);
    if (count < LEAST_ROWS) return [];
    const lane = (rows: number[], side: Lane["side"]): Lane => ({
      share,
      side,
      offsetM: (track.sense * rows.reduce((sum, row) => sum + offsetM[row]!, 0)) / rows.length,
      values: meanOfRows(track, rows),
    });
    if (count === order.length) return [lane(order, 0)];
    // Right of the machine is right of the axis only for a pass that runs along it.
    return [
      lane(order.slice(0, count), track.sense === 1 ? -1 : 1),
      lane(order.slice(order.length - count), track.sense),
    ];
  });
}

/** Mean over rows of each record, every row less its own mean in the pass, so that a row that drops out moves nothing. */
function meanOfRows({ readings, rows, records }: LaneTrack, chosen: number[]): Float64Array {
  const sums = new Float64Array(records);
  const counts = new Float64Array(records);
  for (const row of chosen) {
    let sum = 0;
    let count = 0;
    for (let record = 0; record < records; record++) {
      const value = readings[record * rows + row]!;
      if (Number.isNaN(value)) continue;
      sum += value;
      count++;
    }
    // A row that hardly speaks has no mean to be taken from.
    if (count < records / 2) continue;
    const mean = sum / count;
    for (let record = 0; record < records; record++) {
      const value = readings[record * rows + row]!;
      if (Number.isNaN(value)) continue;
      sums[record]! += value - mean;
      counts[record]! += 1;
    }
  }
  return sums.map((sum, record) => (counts[record]! > 0 ? sum / counts[record]! : NaN));
}
