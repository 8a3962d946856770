import type { LaneTrack } from "@/lib/alignment/lane-track";

/** Two neighbouring passes driven in opposite directions, by their place in the list of tracks. */
export interface OppositePair {
  /** Runs along the axis. */
  forward: number;
  /** Runs against it. */
  backward: number;
  /** Side of `forward` on which `backward` lies, looking along the axis. */
  side: 1 | -1;
}

/** Neighbours lie this many widths apart, between centre lines. */
const NEIGHBOUR_WIDTHS: [number, number] = [0.3, 1.7];

/**
 * Every pass with its nearest neighbour on either side, where that ran the other way and at least `overlapM` of ground lies
 * beside both. Each pair once, in order of the passes.
 */
export function findOppositePairs(
  tracks: readonly LaneTrack[],
  { widthM, overlapM }: { widthM: number; overlapM: number },
): OppositePair[] {
  const pairs: OppositePair[] = [];
  tracks.forEach((track, forward) => {
    if (track.sense !== 1) return;
    for (const side of [-1, 1] as const) {
      const backward = nearestBeside(tracks, forward, { side, widthM, overlapM });
      if (backward === null || tracks[backward]!.sense === 1) continue;
      const back = nearestBeside(tracks, backward, { side: side === 1 ? -1 : 1, widthM, overlapM });
      if (back === forward) pairs.push({ forward, backward, side });
    }
  });
  return pairs;
}

function nearestBeside(
  tracks: readonly LaneTrack[],
  of: number,
  { side, widthM, overlapM }: { side: 1 | -1; widthM: number; overlapM: number },
): number | null {
  const own = tracks[of]!;
  let nearest: number | null = null;
  let nearestM = NEIGHBOUR_WIDTHS[1] * widthM;
  tracks.forEach((other, index) => {
    const apartM = side * (other.acrossM - own.acrossM);
    if (index === of || apartM < NEIGHBOUR_WIDTHS[0] * widthM || apartM >= nearestM) return;
    if (Math.min(own.toM, other.toM) - Math.max(own.fromM, other.fromM) < overlapM) return;
    nearest = index;
    nearestM = apartM;
  });
  return nearest;
}
