// The loop over draws is a kernel: it goes through every draw, pass and part.
import type { PassSums } from "@/lib/pass-figures/resample-passes";
import { createSeededRandom } from "@/lib/simulator/seeded-random";

/** Draws of one interval, an odd number so that quantiles fall on values. */
export const DRAWS = 1999;

/** Means of every part in passes drawn anew: `means[draw * parts + part]`; NaN where a draw has no weight in a part. */
export interface DrawnMeans {
  parts: number;
  means: Float64Array;
}

/**
 * Circular block bootstrap (Politis and Romano 1992): runs of consecutive passes are drawn with replacement until there are
 * as many passes as there were; in runs of one it draws single passes (Künsch 1989). The same seed and label always draw alike.
 */
export function drawPasses(
  { passes, parts, sums, weights }: PassSums,
  { passesPerBlock, seed, label }: { passesPerBlock: number; seed: number; label: string },
): DrawnMeans {
  const { uniform } = createSeededRandom(seed, label);
  const means = new Float64Array(DRAWS * parts);
  const sum = new Float64Array(parts);
  const weight = new Float64Array(parts);
  for (let draw = 0; draw < DRAWS; draw++) {
    sum.fill(0);
    weight.fill(0);
    for (let k = 0, at = 0; k < passes; k++) {
      at = k % passesPerBlock === 0 ? Math.floor(uniform() * passes) : (at + 1) % passes;
      const from = at * parts;
      for (let part = 0; part < parts; part++) {
        sum[part]! += sums[from + part]!;
        weight[part]! += weights[from + part]!;
      }
    }
    for (let part = 0; part < parts; part++) {
      means[draw * parts + part] = weight[part]! > 0 ? sum[part]! / weight[part]! : NaN;
    }
  }
  return { parts, means };
}
