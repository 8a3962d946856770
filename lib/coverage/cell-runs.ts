import { nextColumn, type BitGrid } from "@/lib/coverage/bit-grid";

/** Cells `from .. end - 1` of a row of a grid. */
export interface CellRun {
  row: number;
  from: number;
  end: number;
}

/** The set cells of a grid, row by row from left to right. */
export function gridRuns(grid: BitGrid): CellRun[] {
  const runs: CellRun[] = [];
  for (let row = 0; row < grid.rows; row++) {
    for (let from = nextColumn(grid, row, 0, true); from < grid.columns;) {
      const end = nextColumn(grid, row, from, false);
      runs.push({ row, from, end });
      from = nextColumn(grid, row, end, true);
    }
  }
  return runs;
}

/** Runs of a word's bits. */
export function wordRuns(row: number, word: number, bits: number): CellRun[] {
  const runs: CellRun[] = [];
  let rest = bits >>> 0;
  while (rest !== 0) {
    const from = 31 - Math.clz32(rest & -rest);
    const shifted = ~(rest >>> from);
    const length = shifted === 0 ? 32 : 31 - Math.clz32(shifted & -shifted);
    runs.push({ row, from: word * 32 + from, end: word * 32 + from + length });
    rest = from + length >= 32 ? 0 : (rest >>> (from + length)) << (from + length);
    rest >>>= 0;
  }
  return runs;
}

/** Runs in order (row, then column), those that meet or overlap joined. */
export function joinRuns(runs: CellRun[]): CellRun[] {
  const joined: CellRun[] = [];
  for (const run of [...runs].sort((a, b) => a.row - b.row || a.from - b.from)) {
    const last = joined[joined.length - 1];
    if (last && last.row === run.row && run.from <= last.end) last.end = Math.max(last.end, run.end);
    else joined.push({ ...run });
  }
  return joined;
}

/** Pieces of ground: runs (in order) that touch from row to row, in corners too unless `sidesOnly`. */
export function connectRuns(runs: readonly CellRun[], { sidesOnly = false } = {}): CellRun[][] {
  const parent = Int32Array.from(runs, (_, k) => k);
  const find = (k: number): number => {
    while (parent[k] !== k) k = parent[k] = parent[parent[k]!]!;
    return k;
  };
  const reach = sidesOnly ? 0 : 1;
  let above = 0;
  for (let k = 0; k < runs.length; k++) {
    const run = runs[k]!;
    const isPast = (upper: CellRun) =>
      upper.row < run.row - 1 || (upper.row === run.row - 1 && upper.end + reach <= run.from);
    while (isPast(runs[above]!)) above++;
    for (let other = above; other < k; other++) {
      const upper = runs[other]!;
      if (upper.row >= run.row || upper.from >= run.end + reach) break;
      parent[find(other)] = find(k);
    }
  }
  const pieces = new Map<number, CellRun[]>();
  runs.forEach((run, k) => {
    const root = find(k);
    const piece = pieces.get(root);
    if (piece) piece.push(run);
    else pieces.set(root, [run]);
  });
  return [...pieces.values()];
}

export function countCells(runs: readonly CellRun[]): number {
  return runs.reduce((sum, run) => sum + run.end - run.from, 0);
}
