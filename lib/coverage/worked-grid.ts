import { createBitGrid, type BitGrid, type Bounds } from "@/lib/coverage/bit-grid";

/** Ground worked again by a later stretch: cells `bits` of one word of the grid. Stretches by their numbers. */
export type VisitAgain = (again: { row: number; word: number; bits: number; later: number; earlier: number }) => void;

/**
 * Which cells are worked, and by which stretches. A word of 32 cells remembers its stretch while it has only one; the words
 * along the seams keep a list, each entry with the cells of one stretch, the latest first.
 */
export interface WorkedGrid {
  cells: BitGrid;
  /** A word: 0 nobody, n > 0 stretch n - 1 alone, n < 0 the list that begins at entry -n - 1. */
  owner: Int32Array;
  lists: OwnerLists;
}

interface OwnerLists {
  length: number;
  stretch: Int32Array;
  mask: Uint32Array;
  /** Entry that follows, or -1. */
  next: Int32Array;
}

export function createWorkedGrid(bounds: Bounds, cellM: number, maxCells: number): WorkedGrid {
  const cells = createBitGrid(bounds, cellM, maxCells);
  const size = 1024;
  return {
    cells,
    owner: new Int32Array(cells.words.length),
    lists: { length: 0, stretch: new Int32Array(size), mask: new Uint32Array(size), next: new Int32Array(size) },
  };
}

/** An empty piece of a grid over `bounds`, its words lying on words of the whole. */
export interface Window {
  grid: BitGrid;
  firstRow: number;
  firstWord: number;
}

export function openWindow(whole: BitGrid, bounds: Bounds): Window {
  const at = (value: number, origin: number) => Math.floor((value - origin) / whole.cellM);
  const firstRow = Math.max(0, at(bounds.minY, whole.originY) - 1);
  const lastRow = Math.min(whole.rows - 1, at(bounds.maxY, whole.originY) + 1);
  const firstWord = Math.max(0, at(bounds.minX, whole.originX) - 1) >>> 5;
  const lastWord = Math.min(whole.wordsPerRow - 1, (at(bounds.maxX, whole.originX) + 1) >>> 5);
  const rows = lastRow - firstRow + 1;
  const wordsPerRow = lastWord - firstWord + 1;
  const grid = {
    originX: whole.originX + firstWord * 32 * whole.cellM,
    originY: whole.originY + firstRow * whole.cellM,
    cellM: whole.cellM,
    columns: Math.min(wordsPerRow * 32, whole.columns - firstWord * 32),
    rows,
    wordsPerRow,
    words: new Uint32Array(rows * wordsPerRow),
  };
  return { grid, firstRow, firstWord };
}

/** Adds the ground of one stretch, drawn in a window, and tells which of it was worked before. */
// kernel: hot loop over every word of every window
export function addStretch(
  worked: WorkedGrid,
  { grid, firstRow, firstWord }: Window,
  stretch: number,
  visit: VisitAgain,
): void {
  const { cells, owner } = worked;
  const { words, wordsPerRow, rows } = grid;
  for (let row = 0, at = 0; row < rows; row++) {
    let target = (firstRow + row) * cells.wordsPerRow + firstWord;
    for (let word = 0; word < wordsPerRow; word++, at++, target++) {
      const own = words[at]!;
      if (own === 0) continue;
      const before = cells.words[target]!;
      cells.words[target] = before | own;
      if (before === 0) owner[target] = stretch + 1;
      else if (owner[target] !== stretch + 1) {
        shareWord(worked, { target, stretch, own, before, row: firstRow + row, word: firstWord + word, visit });
      }
    }
  }
}

interface SharedWord {
  target: number;
  stretch: number;
  own: number;
  before: number;
  row: number;
  word: number;
  visit: VisitAgain;
}

function shareWord({ owner, lists }: WorkedGrid, shared: SharedWord): void {
  const { target, stretch, own, before, row, word, visit } = shared;
  if (owner[target]! > 0) owner[target] = -pushEntry(lists, owner[target]! - 1, before, -1) - 1;
  const head = -owner[target]! - 1;
  let rest = own & before;
  for (let entry = head; entry >= 0 && rest !== 0; entry = lists.next[entry]!) {
    const bits = rest & lists.mask[entry]!;
    if (bits === 0) continue;
    rest &= ~bits;
    const earlier = lists.stretch[entry]!;
    if (earlier !== stretch) visit({ row, word, bits, later: stretch, earlier });
  }
  if (lists.stretch[head] === stretch) lists.mask[head]! |= own;
  else owner[target] = -pushEntry(lists, stretch, own, head) - 1;
}

/** @returns the number of the new entry */
// kernel: hot, so positional
function pushEntry(lists: OwnerLists, stretch: number, mask: number, next: number): number {
  if (lists.length === lists.stretch.length) {
    const grow = <T extends Int32Array | Uint32Array>(into: T, from: T): T => (into.set(from), into);
    const size = 2 * lists.length;
    lists.stretch = grow(new Int32Array(size), lists.stretch);
    lists.mask = grow(new Uint32Array(size), lists.mask);
    lists.next = grow(new Int32Array(size), lists.next);
  }
  const entry = lists.length++;
  lists.stretch[entry] = stretch;
  lists.mask[entry] = mask;
  lists.next[entry] = next;
  return entry;
}

/** The stretches that worked a cell; none for a cell outside the grid or not worked. */
export function ownersAt({ cells, owner, lists }: WorkedGrid, row: number, column: number): number[] {
  if (row < 0 || row >= cells.rows || column < 0 || column >= cells.columns) return [];
  const at = row * cells.wordsPerRow + (column >>> 5);
  const bit = 1 << (column & 31);
  if ((cells.words[at]! & bit) === 0) return [];
  if (owner[at]! > 0) return [owner[at]! - 1];
  const found: number[] = [];
  for (let entry = -owner[at]! - 1; entry >= 0; entry = lists.next[entry]!) {
    if ((lists.mask[entry]! & bit) !== 0) found.push(lists.stretch[entry]!);
  }
  return found;
}
