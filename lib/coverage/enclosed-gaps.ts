import { emptyCopy, isSet, nextColumn, setSpan, type BitGrid } from "@/lib/coverage/bit-grid";

/**
 * Clear cells that lie between set ones along both directions of the grid, in gaps of at most `maxGap` cells; only those set
 * in `inside`, where it is given.
 */
export function markEnclosedGaps(grid: BitGrid, maxGap: number, inside: BitGrid | null): BitGrid {
  const gaps = markRowGaps(grid, maxGap);
  if (inside) for (let k = 0; k < gaps.words.length; k++) gaps.words[k]! &= inside.words[k]!;
  const enclosed = emptyCopy(grid);
  const lastSet = new Int32Array(grid.wordsPerRow * 32).fill(-1);
  for (let row = 0; row < grid.rows; row++) {
    for (let word = 0; word < grid.wordsPerRow; word++) {
      const now = grid.words[row * grid.wordsPerRow + word]!;
      const before = row > 0 ? grid.words[(row - 1) * grid.wordsPerRow + word]! : 0;
      for (let bits = before & ~now; bits !== 0; bits &= bits - 1) lastSet[columnOf(word, bits)] = row - 1;
      for (let bits = now & ~before; bits !== 0; bits &= bits - 1) {
        const column = columnOf(word, bits);
        markColumnGap(gaps, enclosed, column, { after: lastSet[column]!, before: row, maxGap });
      }
    }
  }
  return enclosed;
}

function columnOf(word: number, bits: number): number {
  return (word << 5) + 31 - Math.clz32(bits & -bits);
}

function markRowGaps(grid: BitGrid, maxGap: number): BitGrid {
  const gaps = emptyCopy(grid);
  for (let row = 0; row < grid.rows; row++) {
    let column = nextColumn(grid, row, 0, true);
    while (column < grid.columns) {
      const from = nextColumn(grid, row, column, false);
      const end = nextColumn(grid, row, from, true);
      if (end < grid.columns && end - from <= maxGap) setSpan(gaps, row, from, end);
      column = end;
    }
  }
  return gaps;
}

interface ColumnGap {
  after: number;
  before: number;
  maxGap: number;
}

// kernel: hot, so positional
function markColumnGap(gaps: BitGrid, enclosed: BitGrid, column: number, { after, before, maxGap }: ColumnGap): void {
  if (after < 0 || before - after - 1 > maxGap) return;
  for (let row = after + 1; row < before; row++) {
    if (isSet(gaps, row, column)) setSpan(enclosed, row, column, column + 1);
  }
}
