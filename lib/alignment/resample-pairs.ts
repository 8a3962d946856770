import { createSeededRandom } from "@/lib/simulator/seeded-random";
import type { DelayFit, SideSums } from "@/lib/alignment/fit-delay";
import { sumSides } from "@/lib/alignment/fit-delay";
import type { MatchSurface } from "@/lib/alignment/match-surface";

/** Standard error of a fitted number, and the half width of its 95 % interval. */
export interface Spread {
  sd: number;
  halfWidth: number;
}

export interface ResampledFit {
  delayS: Spread;
  distanceM: Spread;
  shiftM: Spread;
}

/** Neighbouring pairs share a pass, so they are drawn in runs of this many (moving blocks, Kunsch 1989). */
const RUN = 2;
const SEED = 20_310_925;

/**
 * Spread of a fit when pairs are drawn again with replacement, in runs of neighbours. The sd is widened for the small
 * number of pairs (n / (n - 1), and Student's t instead of the normal). Null where too few draws could be fitted.
 */
export function resamplePairs(
  surface: MatchSurface,
  options: { resamples: number; usualSpeedMps: number; fit: (sums: SideSums) => DelayFit | null },
): ResampledFit | null {
  const random = createSeededRandom(SEED, "pairs drawn again");
  const n = surface.pairs.length;
  const delays: number[] = [];
  const distances: number[] = [];
  const drawn = new Int32Array(n);
  for (let resample = 0; resample < options.resamples; resample++) {
    for (let k = 0; k < n; k += RUN) {
      const start = Math.floor(random.uniform() * n);
      for (let run = 0; run < RUN && k + run < n; run++) drawn[k + run] = (start + run) % n;
    }
    const fit = options.fit(sumSides(surface, drawn));
    if (!fit) continue;
    delays.push(fit.delayS);
    distances.push(fit.distanceM);
  }
  if (delays.length < 0.9 * options.resamples) return null;
  const shifts = delays.map((delayS, k) => distances[k]! + options.usualSpeedMps * delayS);
  const widen = Math.sqrt(n / (n - 1)) * studentT975(n - 1);
  const spread = (values: number[]): Spread => {
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
    const sd = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1));
    return { sd, halfWidth: widen * sd };
  };
  return { delayS: spread(delays), distanceM: spread(distances), shiftM: spread(shifts) };
}

/** 97.5 % point of Student's t: expansion in 1 / df about the normal's (Abramowitz & Stegun 26.7.5). Within 0.1 % from 5 df. */
export function studentT975(degreesOfFreedom: number): number {
  const z = 1.959963984540054;
  const v = degreesOfFreedom;
  const g1 = (z ** 3 + z) / 4;
  const g2 = (5 * z ** 5 + 16 * z ** 3 + 3 * z) / 96;
  const g3 = (3 * z ** 7 + 19 * z ** 5 + 17 * z ** 3 - 15 * z) / 384;
  const g4 = (79 * z ** 9 + 776 * z ** 7 + 1482 * z ** 5 - 1920 * z ** 3 - 945 * z) / 92160;
  return z + g1 / v + g2 / v ** 2 + g3 / v ** 3 + g4 / v ** 4;
}
