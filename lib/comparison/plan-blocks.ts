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
