import { layOnGrid, placesBefore, type GridSignal } from "@/lib/alignment/lay-on-grid";
import type { Lane, LaneTrack } from "@/lib/alignment/lane-track";
import type { OppositePair } from "@/lib/alignment/opposite-pairs";

/** Sums of squared differences of one pair about their mean, and how many, `[delay * lags + lag]`. */
export interface PairMatches {
  side: 1 | -1;
  /** Between the compared lanes, metres. */
  apartM: number;
  squares: Float64Array;
  /** The same of the sums of both passes: small where one pass mirrors the other, sign turned. */
  mirrored: Float64Array;
  counts: Float64Array;
}

/** How well the passes of every pair match at each delay, and with one moved along the axis against the other. */
export interface MatchSurface {
  delaysS: number[];
  stepM: number;
  /** Moves tried: -lagReach to lagReach steps. Move m compares place s of the forward pass with s + m of the other. */
  lagReach: number;
  pairs: PairMatches[];
}

export interface MatchInput {
  tracks: readonly LaneTrack[];
  /** Cleaned lanes of each track. */
  lanes: readonly (readonly Lane[])[];
  pairs: readonly OppositePair[];
  share: number;
  delaysS: number[];
  stepM: number;
  lagReach: number;
}

export function measureMatches(input: MatchInput): MatchSurface {
  const { tracks, lanes, pairs, share, delaysS, stepM, lagReach } = input;
  const laneOf = (track: number, side: 1 | -1) =>
    lanes[track]!.find((lane) => lane.share === share && (lane.side === side || lane.side === 0))!;
  const lags = 2 * lagReach + 1;
  const size = delaysS.length * lags;
  const measured = pairs.map((pair): PairMatches => {
    const from = tracks[pair.forward]!.acrossM + laneOf(pair.forward, pair.side).offsetM;
    const to = tracks[pair.backward]!.acrossM + laneOf(pair.backward, pair.side === 1 ? -1 : 1).offsetM;
    return {
      side: pair.side,
      apartM: Math.abs(to - from),
      squares: new Float64Array(size),
      mirrored: new Float64Array(size),
      counts: new Float64Array(size),
    };
  });
  const used = [...new Set(pairs.flatMap(({ forward, backward }) => [forward, backward]))];
  const grids = new Map(
    used.flatMap((track) => ([1, -1] as const).map((side) => [`${track}:${side}`, emptyGrid(tracks[track]!, stepM)])),
  );
  delaysS.forEach((delayS, row) => {
    for (const track of used) {
      const { timeS, alongM } = tracks[track]!;
      const places = placesBefore(timeS, alongM, delayS);
      for (const side of [1, -1] as const) {
        layOnGrid(places, laneOf(track, side).values, stepM, grids.get(`${track}:${side}`)!);
      }
    }
    pairs.forEach(({ forward, backward, side }, index) => {
      const first = grids.get(`${forward}:${side}`)!;
      const second = grids.get(`${backward}:${side === 1 ? -1 : 1}`)!;
      compareGrids(first, second, lagReach, measured[index]!, row * lags);
    });
  });
  return { delaysS, stepM, lagReach, pairs: measured };
}

function emptyGrid(track: LaneTrack, stepM: number): GridSignal {
  const first = Math.ceil(track.fromM / stepM);
  const last = Math.floor(track.toM / stepM);
  return { first, values: new Float64Array(Math.max(1, last - first + 1)) };
}

// kernel: the innermost loop of the search
function compareGrids(
  forward: GridSignal,
  backward: GridSignal,
  lagReach: number,
  into: PairMatches,
  at: number,
): void {
  const first = forward.values;
  const second = backward.values;
  for (let lag = -lagReach; lag <= lagReach; lag++) {
    const shift = forward.first + lag - backward.first;
    const end = Math.min(first.length, second.length - shift);
    let squares = 0;
    let sum = 0;
    let mirrored = 0;
    let both = 0;
    let count = 0;
    for (let k = Math.max(0, -shift); k < end; k++) {
      const a = first[k]!;
      const b = second[k + shift]!;
      const difference = a - b;
      // NaN differs from itself.
      if (difference !== difference) continue;
      squares += difference * difference;
      sum += difference;
      mirrored += (a + b) * (a + b);
      both += a + b;
      count++;
    }
    into.squares[at + lag + lagReach] = count > 0 ? squares - (sum * sum) / count : 0;
    into.mirrored[at + lag + lagReach] = count > 0 ? mirrored - (both * both) / count : 0;
    into.counts[at + lag + lagReach] = count;
  }
}
