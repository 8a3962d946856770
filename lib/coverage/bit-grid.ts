/** A grid of yes/no cells, 32 to a word, rows of cells padded to whole words. Cell (0, 0) has its corner at the origin. */
export interface BitGrid {
  originX: number;
  originY: number;
  cellM: number;
  columns: number;
  rows: number;
  wordsPerRow: number;
  words: Uint32Array;
}

export interface Bounds {
  minX: number;
  minY: number;
  maxX: number;
  maxY: number;
}

/** An empty grid over `bounds`; its cells grow from `cellM` where there would be more than `maxCells` of them. */
export function createBitGrid(bounds: Bounds, cellM: number, maxCells: number): BitGrid {
  const width = bounds.maxX - bounds.minX;
  const height = bounds.maxY - bounds.minY;
  const side = Math.max(cellM, Math.sqrt((width * height) / maxCells));
  const columns = Math.ceil(width / side) + 2;
  const rows = Math.ceil(height / side) + 2;
  const wordsPerRow = (columns + 31) >>> 5;
  return {
    originX: bounds.minX - side,
    originY: bounds.minY - side,
    cellM: side,
    columns,
    rows,
    wordsPerRow,
    words: new Uint32Array(wordsPerRow * rows),
  };
}

/** An empty grid with the same cells. */
export function emptyCopy(grid: BitGrid): BitGrid {
  return { ...grid, words: new Uint32Array(grid.words.length) };
}

/** Sets cells `from .. end - 1` of a row of the grid. */
// kernel: hot, so positional
export function setSpan(grid: BitGrid, row: number, from: number, end: number): void {
  if (end <= from) return;
  const base = row * grid.wordsPerRow;
  const first = from >>> 5;
  const last = (end - 1) >>> 5;
  const head = 0xffffffff << (from & 31);
  const tail = 0xffffffff >>> (31 - ((end - 1) & 31));
  if (first === last) {
    grid.words[base + first]! |= head & tail;
    return;
  }
  grid.words[base + first]! |= head;
  for (let word = base + first + 1; word < base + last; word++) grid.words[word] = 0xffffffff;
  grid.words[base + last]! |= tail;
}

/** The first column whose centre is not left of x, within the grid. */
export function firstCentreAfter(grid: BitGrid, x: number): number {
  return Math.min(grid.columns, Math.max(0, Math.ceil((x - grid.originX) / grid.cellM - 0.5)));
}

export function isSet(grid: BitGrid, row: number, column: number): boolean {
  return ((grid.words[row * grid.wordsPerRow + (column >>> 5)]! >>> (column & 31)) & 1) === 1;
}

/** Number of cells set. */
export function countBits(grid: BitGrid): number {
  let count = 0;
  for (let at = 0; at < grid.words.length; at++) count += countWordBits(grid.words[at]!);
  return count;
}

/** Number of bits set in a word of 32. */
export function countWordBits(bits: number): number {
  let word = bits - ((bits >>> 1) & 0x55555555);
  word = (word & 0x33333333) + ((word >>> 2) & 0x33333333);
  return Math.imul((word + (word >>> 4)) & 0x0f0f0f0f, 0x01010101) >>> 24;
}

/** First column at or after `from` whose cell is set (or, with `wanted` false, clear); `columns` where there is none. */
// kernel: hot, so positional
export function nextColumn(grid: BitGrid, row: number, from: number, wanted: boolean): number {
  const base = row * grid.wordsPerRow;
  let mask = 0xffffffff << (from & 31);
  for (let word = from >>> 5; word < grid.wordsPerRow; word++) {
    const bits = (wanted ? grid.words[base + word]! : ~grid.words[base + word]!) & mask;
    if (bits !== 0) return Math.min(grid.columns, (word << 5) + 31 - Math.clz32(bits & -bits));
    mask = 0xffffffff;
  }
  return grid.columns;
}
