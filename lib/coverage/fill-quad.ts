import { firstCentreAfter, setSpan, type BitGrid } from "@/lib/coverage/bit-grid";

const cornerX = new Float64Array(4);
const cornerY = new Float64Array(4);
const crossings = new Float64Array(4);

/**
 * Sets the cells whose centre lies inside four corners (x, y four times round), by the even-odd rule: what `fillPolygon` does
 * for any rings, without a list a row of the grid. A log has a quad a record, each some dozens of grid rows high.
 */
// kernel: hot loop over every grid row of every record
export function fillQuad(grid: BitGrid, quad: Float64Array): void {
  let low = quad[1]!;
  let high = low;
  for (let k = 0; k < 4; k++) {
    const y = quad[2 * k + 1]!;
    cornerX[k] = quad[2 * k]!;
    cornerY[k] = y;
    if (y < low) low = y;
    if (y > high) high = y;
  }
  const firstRow = Math.max(0, Math.ceil((low - grid.originY) / grid.cellM - 0.5));
  const lastRow = Math.min(grid.rows - 1, Math.floor((high - grid.originY) / grid.cellM - 0.5));
  for (let row = firstRow; row <= lastRow; row++) {
    const count = crossRow(grid.originY + (row + 0.5) * grid.cellM);
    if (count > 2) crossings.subarray(0, count).sort();
    for (let k = 0; k + 1 < count; k += 2) {
      const a = crossings[k]!;
      const b = crossings[k + 1]!;
      setSpan(grid, row, firstCentreAfter(grid, a < b ? a : b), firstCentreAfter(grid, a < b ? b : a));
    }
  }
}

/** Writes where the edges cross this height; answers how many do: none, two or four. */
// kernel: hot, so positional
function crossRow(y: number): number {
  let count = 0;
  let isBelow = cornerY[3]! <= y;
  for (let k = 3, next = 0; next < 4; k = next++) {
    const nextBelow = cornerY[next]! <= y;
    if (nextBelow !== isBelow) {
      const share = (y - cornerY[k]!) / (cornerY[next]! - cornerY[k]!);
      crossings[count++] = cornerX[k]! + share * (cornerX[next]! - cornerX[k]!);
    }
    isBelow = nextBelow;
  }
  return count;
}
