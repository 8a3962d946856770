import type { TileCanvas } from "@/lib/tiles/rasterise-tile";

/**
 * Samples lie at most this far apart, in pixels. Any square lattice that fine has a point in every disc of half a pixel's
 * radius (0.7 / sqrt 2 < 0.5), so no pixel inside the ground worked stays empty, whatever the heading.
 */
const SAMPLE_SPACING_PX = 0.7;

export interface AccumulateOptions {
  canvas: TileCanvas;
  /** World units, in order round the cell: start left, start right, end right, end left. */
  corners: Float64Array;
  value: number;
  /** Distance the reading stands for, metres: its weight. */
  lengthM: number;
  weights: Float64Array;
  sums: Float64Array;
  /** Keeps the least value of a pixel instead of adding up. */
  keepsLeast: boolean;
}

/**
 * Shares a reading out over the pixels its cell covers, in proportion to the part of the cell in each. A cell smaller than
 * the spacing counts wholly for the pixel its middle lies in.
 */
export function accumulateCell(options: AccumulateOptions): void {
  const { canvas, corners, value, lengthM, weights, sums, keepsLeast } = options;
  const { pixelsPerWorld: scale, left, top, size } = canvas;
  // Whole-zoom pixel numbers until after the floor: neighbouring tiles then place each sample alike.
  const ax = corners[0]! * scale;
  const ay = corners[1]! * scale;
  const acrossX = corners[2]! * scale - ax;
  const acrossY = corners[3]! * scale - ay;
  const alongX = corners[6]! * scale - ax;
  const alongY = corners[7]! * scale - ay;
  const twistX = corners[4]! * scale - ax - acrossX - alongX;
  const twistY = corners[5]! * scale - ay - acrossY - alongY;
  const across = Math.max(1, Math.ceil(Math.hypot(acrossX, acrossY) / SAMPLE_SPACING_PX));
  const along = Math.max(1, Math.ceil(Math.hypot(alongX, alongY) / SAMPLE_SPACING_PX));
  const weight = lengthM / (across * along);
  if (!(weight > 0)) return;
  for (let i = 0; i < along; i += 1) {
    const v = (i + 0.5) / along;
    for (let j = 0; j < across; j += 1) {
      const u = (j + 0.5) / across;
      const column = Math.floor(ax + u * acrossX + v * alongX + u * v * twistX) - left;
      const row = Math.floor(ay + u * acrossY + v * alongY + u * v * twistY) - top;
      if (column < 0 || row < 0 || column >= size || row >= size) continue;
      const at = row * size + column;
      if (keepsLeast) {
        if (weights[at] === 0 || value < sums[at]!) sums[at] = value;
        weights[at] = 1;
      } else {
        weights[at]! += weight;
        sums[at]! += weight * value;
      }
    }
  }
}
