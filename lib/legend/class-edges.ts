/** The class (from 0) of a value among rising inner edges; an edge belongs to the class above. */
export function classOf(value: number, edges: readonly number[]): number {
  let at = 0;
  while (at < edges.length && value >= edges[at]!) at += 1;
  return at;
}

/** Whether edges can divide a scale: at least one, all finite, each above the one before. */
export function areClassEdges(edges: readonly number[]): boolean {
  return edges.length > 0 && edges.every((edge, i) => Number.isFinite(edge) && (i === 0 || edge > edges[i - 1]!));
}

/** Edges that cut `minimum .. maximum` into `count` classes of equal width. */
export function equalEdges(minimum: number, maximum: number, count: number): number[] {
  const width = (maximum - minimum) / count;
  if (!(width > 0)) return [minimum];
  return Array.from({ length: count - 1 }, (_, index) => minimum + (index + 1) * width);
}

/** Counts of readings in equal bins of `minimum .. maximum`. */
export interface Histogram {
  minimum: number;
  maximum: number;
  counts: number[];
  /** Metres of row in each bin, where known. */
  distancesM?: number[];
}

/** Bins values; NaN is left out, values at the upper end fall in the last bin. */
export function histogramOf(values: ArrayLike<number>, minimum: number, maximum: number, bins = 64): Histogram {
  const counts = new Array<number>(bins).fill(0);
  const width = (maximum - minimum) / bins || 1;
  for (let i = 0; i < values.length; i += 1) {
    const bin = Math.floor((values[i]! - minimum) / width);
    if (bin >= 0 && bin <= bins) counts[Math.min(bins - 1, bin)]! += 1;
  }
  return { minimum, maximum, counts };
}

/** Edges that put about as many readings in each of `count` classes, read off a histogram (linear within a bin). */
export function quantileEdges(histogram: Histogram, count: number): number[] {
  const total = histogram.counts.reduce((sum, n) => sum + n, 0);
  const width = (histogram.maximum - histogram.minimum) / histogram.counts.length;
  const edges: number[] = [];
  let seen = 0;
  histogram.counts.forEach((n, bin) => {
    while (edges.length < count - 1 && n > 0 && seen + n >= ((edges.length + 1) * total) / count) {
      const within = (((edges.length + 1) * total) / count - seen) / n;
      edges.push(histogram.minimum + (bin + within) * width);
    }
    seen += n;
  });
  return edges.filter((edge, i) => i === 0 || edge > edges[i - 1]!);
}

/**
 * Seven classes about a target: within half its tolerance, within the tolerance, within twice it, and beyond. The edge one
 * tolerance below is where a reading counts as under target.
 */
export function edgesAroundTarget(target: number, tolerance: number): number[] {
  return [-2, -1, -0.5, 0.5, 1, 2].map((times) => target + times * tolerance);
}

/**
 * Contact-load classes used in research, newtons: light from 180, medium from 490, heavy from 890 (40, 110, 200 lb).
 * Source: Hanna, Steward and Aldinger 2010, Applied Engineering in Agriculture 26(4):551-556.
 */
export const CONTACT_LOAD_EDGES_N = [180, 490, 890] as const;
/** The same as the source gives them in pounds-force. */
export const CONTACT_LOAD_EDGES_LBF = [40, 110, 200] as const;
