import type { MatchSurface } from "@/lib/alignment/match-surface";

/** J of both sides summed over pairs; a pair may be drawn several times. */
export interface SideSums {
  squares: [Float64Array, Float64Array];
  mirrored: [Float64Array, Float64Array];
  counts: [Float64Array, Float64Array];
}

export interface DelayFit {
  delayS: number;
  /** Beside the delay; 0 where it was held there. */
  distanceM: number;
  /** By which the pattern lies askew between neighbouring lanes. */
  skewM: number;
  j: number;
  /** Whether the best lies inside what was tried. */
  isInside: boolean;
}

/** What may move beside the delay. */
export interface FitFreedom {
  /** Largest distance tried, in steps of the grid; 0 holds it at 0. */
  distanceSteps: number;
  /** Skews tried, in steps of the grid. */
  skewSteps: { from: number; to: number };
}

/** Sums over the chosen pairs, or over all. */
export function sumSides(
  surface: MatchSurface,
  chosen: ArrayLike<number> = surface.pairs.map((_, index) => index),
): SideSums {
  const size = surface.pairs[0]?.squares.length ?? 0;
  const empty = () => new Float64Array(size);
  const sums: SideSums = { squares: [empty(), empty()], mirrored: [empty(), empty()], counts: [empty(), empty()] };
  for (let n = 0; n < chosen.length; n++) {
    const pair = surface.pairs[chosen[n]!]!;
    const side = pair.side === 1 ? 0 : 1;
    const squares = sums.squares[side];
    const mirrored = sums.mirrored[side];
    const counts = sums.counts[side];
    for (let k = 0; k < size; k++) {
      squares[k]! += pair.squares[k]!;
      mirrored[k]! += pair.mirrored[k]!;
      counts[k]! += pair.counts[k]!;
    }
  }
  return sums;
}

/** J at a delay, a skew and a move; NaN with less than `leastCount` places compared. */
// kernel: asked for in every step of the search
export function matchAt(
  sums: SideSums,
  surface: MatchSurface,
  [row, skew, move]: readonly [number, number, number],
  leastCount: number,
): number {
  const lags = 2 * surface.lagReach + 1;
  const right = row * lags + surface.lagReach + move + skew;
  const left = row * lags + surface.lagReach + move - skew;
  const count = sums.counts[0][right]! + sums.counts[1][left]!;
  return count >= leastCount ? (sums.squares[0][right]! + sums.squares[1][left]!) / count : NaN;
}

/** Correlation of the two passes of a pair at a delay and a skew: 1 the same, -1 mirrored, 0 nothing in common. */
export function correlationAt(sums: SideSums, surface: MatchSurface, row: number, skew: number): number {
  const lags = 2 * surface.lagReach + 1;
  const right = row * lags + surface.lagReach + skew;
  const left = row * lags + surface.lagReach - skew;
  const apart = sums.squares[0][right]! + sums.squares[1][left]!;
  const together = sums.mirrored[0][right]! + sums.mirrored[1][left]!;
  return (together - apart) / (together + apart);
}

/** Most places compared at any delay without a move. */
export function mostCompared(sums: SideSums, surface: MatchSurface): number {
  const lags = 2 * surface.lagReach + 1;
  let most = 0;
  for (let row = 0; row < surface.delaysS.length; row++) {
    const at = row * lags + surface.lagReach;
    most = Math.max(most, sums.counts[0][at]! + sums.counts[1][at]!);
  }
  return most;
}

/** Least J over delay, distance and skew, refined by a parabola in the delay (and the distance, where that is free). */
export function fitDelay(
  sums: SideSums,
  surface: MatchSurface,
  freedom: FitFreedom,
  leastCount: number,
): DelayFit | null {
  const { distanceSteps, skewSteps } = freedom;
  let best: [number, number, number] | null = null;
  let bestJ = Infinity;
  for (let row = 0; row < surface.delaysS.length; row++) {
    for (let skew = skewSteps.from; skew <= skewSteps.to; skew++) {
      for (let move = -2 * distanceSteps; move <= 2 * distanceSteps; move++) {
        const j = matchAt(sums, surface, [row, skew, move], leastCount);
        if (!(j < bestJ)) continue;
        bestJ = j;
        best = [row, skew, move];
      }
    }
  }
  if (!best) return null;
  return refine({ sums, surface, leastCount, best, isDistanceFree: distanceSteps > 0, bestJ, distanceSteps });
}

interface Refinement {
  sums: SideSums;
  surface: MatchSurface;
  leastCount: number;
  best: [number, number, number];
  bestJ: number;
  isDistanceFree: boolean;
  distanceSteps: number;
}

function refine({ sums, surface, leastCount, best, bestJ, isDistanceFree, distanceSteps }: Refinement): DelayFit {
  const [row, skew, move] = best;
  const { delaysS, stepM } = surface;
  const delayStep = delaysS[1]! - delaysS[0]!;
  const at = (rows: number, moves: number) => matchAt(sums, surface, [row + rows, skew, move + moves], leastCount);
  const edgeOfDelay = row === 0 || row === delaysS.length - 1;
  const edgeOfMove = isDistanceFree && Math.abs(move) === 2 * distanceSteps;
  const plain = {
    delayS: delaysS[row]!,
    // A distance x behind the rows moves the forward pass by x one way and the other by x the other way.
    distanceM: isDistanceFree ? (-move * stepM) / 2 : 0,
    skewM: skew * stepM,
    j: bestJ,
  };
  if (edgeOfDelay || edgeOfMove) return { ...plain, isInside: false };
  const [dRow, dMove] = isDistanceFree ? vertexOfSurface(at) : [vertexOfLine(at(-1, 0), bestJ, at(1, 0)), 0];
  return {
    ...plain,
    delayS: plain.delayS + dRow * delayStep,
    distanceM: plain.distanceM - (dMove * stepM) / 2,
    isInside: true,
  };
}

/** Where a parabola through three equidistant points has its least, in steps from the middle one. */
export function vertexOfLine(before: number, middle: number, after: number): number {
  const bend = before - 2 * middle + after;
  if (!(bend > 0)) return 0;
  return Math.max(-1, Math.min(1, (before - after) / (2 * bend)));
}

/** Where the quadratic surface that fits a 3 x 3 neighbourhood best has its least, in steps from its middle. */
function vertexOfSurface(at: (rows: number, moves: number) => number): [number, number] {
  let [sumX, sumY, sumXX, sumYY, sumXY] = [0, 0, 0, 0, 0];
  for (let x = -1; x <= 1; x++) {
    for (let y = -1; y <= 1; y++) {
      const j = at(x, y);
      if (Number.isNaN(j)) return [0, 0];
      sumX += x * j;
      sumY += y * j;
      sumXX += (3 * x * x - 2) * j;
      sumYY += (3 * y * y - 2) * j;
      sumXY += x * y * j;
    }
  }
  // Least squares on a 3 x 3 lattice: slopes sum/6, second derivatives 2 * sum((3x^2-2) j)/6... , cross sum/4.
  const slopeX = sumX / 6;
  const slopeY = sumY / 6;
  const bendX = sumXX / 3;
  const bendY = sumYY / 3;
  const cross = sumXY / 4;
  const determinant = bendX * bendY - cross * cross;
  if (!(bendX > 0) || !(bendY > 0) || !(determinant > 0)) return [0, 0];
  const x = (-slopeX * bendY + slopeY * cross) / determinant;
  const y = (-slopeY * bendX + slopeX * cross) / determinant;
  const clamp = (value: number) => Math.max(-1, Math.min(1, value));
  return [clamp(x), clamp(y)];
}
