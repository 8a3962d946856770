import type { TileCanvas } from "@/lib/tiles/rasterise-tile";

/**
 * Scanline fill: gives `value` to every pixel whose middle lies in the cell. A middle on an edge belongs to the pixel run
 * that starts there, so cells that share an edge neither overlap nor leave a gap. A bow-tie (tight turn) fills both wings.
 */
// kernel: corners in world units, in order round the cell.
export function fillCell(canvas: TileCanvas, corners: Float64Array, value: number): void {
  const { pixelsPerWorld: scale, top, left, size, values } = canvas;
  let low = Infinity;
  let high = -Infinity;
  for (let i = 1; i < 8; i += 2) {
    const y = corners[i]! * scale;
    if (y < low) low = y;
    if (y > high) high = y;
  }
  const firstLine = Math.max(top, Math.ceil(low - 0.5));
  const lastLine = Math.min(top + size - 1, Math.ceil(high - 0.5) - 1);
  for (let line = firstLine; line <= lastLine; line += 1) {
    const middle = line + 0.5;
    let from = Infinity;
    let to = -Infinity;
    for (let i = 0; i < 8; i += 2) {
      const j = (i + 2) & 7;
      let ax = corners[i]!;
      let ay = corners[i + 1]! * scale;
      let bx = corners[j]!;
      let by = corners[j + 1]! * scale;
      // Always from the upper end, so that two cells compute their common edge to the same bit.
      if (ay > by || (ay === by && ax > bx)) {
        const swapX = ax;
        const swapY = ay;
        ax = bx;
        ay = by;
        bx = swapX;
        by = swapY;
      }
      if (ay > middle || by <= middle) continue;
      const x = (ax + ((middle - ay) / (by - ay)) * (bx - ax)) * scale;
      if (x < from) from = x;
      if (x > to) to = x;
    }
    const firstPixel = Math.max(left, Math.ceil(from - 0.5));
    const lastPixel = Math.min(left + size - 1, Math.ceil(to - 0.5) - 1);
    const row = (line - top) * size - left;
    for (let pixel = firstPixel; pixel <= lastPixel; pixel += 1) values[row + pixel] = value;
  }
}
