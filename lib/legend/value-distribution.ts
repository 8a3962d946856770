/** How far a channel's rows drove at each value: value = offset + code * step, codes rising, metres of row a code. */
export interface ValueDistribution {
  offset: number;
  step: number;
  codes: number[];
  distancesM: number[];
}

/** Part of a step by which a value under an edge still counts as on it: readings are kept in single precision. */
const FORGIVEN_STEP = 0.02;

/** The share of distance in each class between rising edges; an edge belongs to the class above. All 0 where nothing was logged. */
export function sharesOfClasses(distribution: ValueDistribution, edges: readonly number[]): number[] {
  const { offset, step, codes, distancesM } = distribution;
  const starts = edges.map((edge) => (edge - offset) / step - FORGIVEN_STEP);
  const metres = new Array<number>(edges.length + 1).fill(0);
  let total = 0;
  let at = 0;
  codes.forEach((code, index) => {
    while (at < starts.length && code >= starts[at]!) at += 1;
    const distanceM = distancesM[index] ?? 0;
    metres[at]! += distanceM;
    total += distanceM;
  });
  return metres.map((classM) => (total > 0 ? classM / total : 0));
}

/** Edges between logged values that leave about as much distance in each of `count` classes; fewer where values are few. */
export function equalDistanceEdges(distribution: ValueDistribution, count: number): number[] {
  const { offset, step, codes, distancesM } = distribution;
  const total = distancesM.reduce((sum, distanceM) => sum + distanceM, 0);
  const edges: number[] = [];
  let seen = 0;
  let next = 1;
  codes.forEach((code, index) => {
    if (next < count && seen > 0 && seen >= (next * total) / count) {
      edges.push(offset + code * step);
      while (next < count && seen >= (next * total) / count) next += 1;
    }
    seen += distancesM[index] ?? 0;
  });
  return edges;
}
