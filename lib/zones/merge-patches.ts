/** A stretch of one row within a pass, as steps of the pass. */
export interface RowRun {
  row: number;
  first: number;
  last: number;
}

/** Numbers of patches from 0, one for each run: runs of neighbouring rows that share a step are one patch. */
export function mergePatches(runs: readonly RowRun[]): number[] {
  const parent = runs.map((_, k) => k);
  const rootOf = (k: number): number => (parent[k] === k ? k : (parent[k] = rootOf(parent[k]!)));
  const byRow = new Map<number, number[]>();
  runs.forEach(({ row }, k) => byRow.set(row, [...(byRow.get(row) ?? []), k]));
  runs.forEach(({ row, first, last }, k) => {
    for (const other of byRow.get(row + 1) ?? []) {
      const { first: start, last: end } = runs[other]!;
      if (start <= last && end >= first) parent[rootOf(other)] = rootOf(k);
    }
  });
  const numbers = new Map<number, number>();
  return runs.map((_, k) => {
    const root = rootOf(k);
    const known = numbers.get(root) ?? numbers.size;
    numbers.set(root, known);
    return known;
  });
}
