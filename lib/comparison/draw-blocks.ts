// The loop over draws is the kernel of a comparison: it goes through every pass, part and draw.
import type { PassSums } from "@/lib/pass-figures/resample-passes";
import { createSeededRandom } from "@/lib/simulator/seeded-random";

/** Draws of one interval, an odd number so that quantiles fall on values. */
export const DRAWS = 1999;
const SEED = 20_311_015;

/** How a log's passes are drawn anew. */
export interface Blocks {
  /** Correlation of a pass's mean with the next one's; NaN where it cannot be known. */
  correlation: number;
  /** Passes with readings. */
  passes: number;
  passesPerBlock: number;
  blocks: number;
}

/**
 * Length of the blocks from the correlation r of neighbouring passes: (1 + r) / (1 - r) passes carry the news of one
 * (the usual effective sample size of a first-order autoregression), to the nearest whole. `series` holds one value a pass,
 * in the order driven, of one or several things that are taken together (the rows).
 */
export function planBlocks(series: readonly Float64Array[]): Blocks {
  const known = series.map((values) => values.filter((value) => Number.isFinite(value)));
  const passes = Math.max(0, ...known.map((values) => values.length));
  const correlation = lagOne(known);
  const positive = Math.min(0.95, Math.max(0, Number.isFinite(correlation) ? correlation : 0));
  const passesPerBlock = Math.round((1 + positive) / (1 - positive));
  return { correlation, passes, passesPerBlock, blocks: Math.floor(passes / passesPerBlock) };
}

/** Lag-one correlation of several series about their own means, pooled. */
function lagOne(series: readonly Float64Array[]): number {
  let [both, own] = [0, 0];
  for (const values of series) {
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
    values.forEach((value, k) => {
      own += (value - mean) ** 2;
      if (k > 0) both += (value - mean) * (values[k - 1]! - mean);
    });
  }
  return own > 0 ? both / own : NaN;
}

/** Means of every part in passes drawn anew: `means[draw * parts + part]`. */
export interface DrawnMeans {
  parts: number;
  means: Float64Array;
}

/**
 * Circular block bootstrap (Politis and Romano 1992): runs of consecutive passes are drawn with replacement until there are as
 * many passes as there were. The same `label` always draws alike.
 */
export function drawBlocks(given: PassSums, passesPerBlock: number, label: string): DrawnMeans {
  const { passes, parts, sums, weights } = given;
  const { uniform } = createSeededRandom(SEED, label);
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
