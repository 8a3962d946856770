import { firstCentreAfter, setSpan, type BitGrid } from "@/lib/coverage/bit-grid";

/**
 * Sets the cells whose centre lies inside the rings (flat x, y lists, closed or not), by the even-odd rule, so that holes
 * stay empty and a ring that crosses itself fills both its parts.
 */
export function fillPolygon(grid: BitGrid, rings: readonly Float64Array[]): void {
  let low = Infinity;
  let high = -Infinity;
  for (const ring of rings) {
    for (let k = 1; k < ring.length; k += 2) {
      low = Math.min(low, ring[k]!);
      high = Math.max(high, ring[k]!);
    }
  }
  const firstRow = Math.max(0, Math.ceil((low - grid.originY) / grid.cellM - 0.5));
  const lastRow = Math.min(grid.rows - 1, Math.floor((high - grid.originY) / grid.cellM - 0.5));
  const crossings: number[] = [];
  for (let row = firstRow; row <= lastRow; row++) {
    crossings.length = 0;
    const y = grid.originY + (row + 0.5) * grid.cellM;
    for (const ring of rings) collectCrossings(ring, y, crossings);
    if (crossings.length > 2) crossings.sort((a, b) => a - b);
    else if (crossings[0]! > crossings[1]!) crossings.reverse();
    for (let k = 0; k + 1 < crossings.length; k += 2) {
      setSpan(grid, row, firstCentreAfter(grid, crossings[k]!), firstCentreAfter(grid, crossings[k + 1]!));
    }
  }
}

function collectCrossings(ring: Float64Array, y: number, crossings: number[]): void {
  let fromX = ring[ring.length - 2]!;
  let fromY = ring[ring.length - 1]!;
  for (let k = 0; k < ring.length; k += 2) {
    const toX = ring[k]!;
    const toY = ring[k + 1]!;
    if (fromY <= y !== toY <= y) crossings.push(fromX + ((y - fromY) / (toY - fromY)) * (toX - fromX));
    fromX = toX;
    fromY = toY;
  }
}
