import type { LogChannel } from "@/lib/logs/machine-log";
import { accumulateCell } from "@/lib/tiles/accumulate-cell";
import { fillCell } from "@/lib/tiles/fill-cell";
import { CHUNK_RECORDS, type TileIndex, writeCellCorners } from "@/lib/tiles/tile-index";
import type { TileAddress } from "@/lib/tiles/tile-address";

/** What drawing needs of a channel, logged or derived. */
export type DrawnChannel = Pick<LogChannel, "rows" | "perRow" | "values"> & {
  /** Values are names, not amounts: far out a pixel carries the least of those it covers, never a mean. */
  isCode?: boolean;
  /** Of names numbered 1 .. so many: far out a pixel carries the one over the longest distance, of two alike the lower. */
  codeCount?: number;
};

export interface TileRequest extends TileAddress {
  /** Pixels along a side. */
  size: number;
}

/** Where a tile lies among all pixels of its zoom, and the pixels themselves. */
export interface TileCanvas {
  size: number;
  /** Pixels a world unit. */
  pixelsPerWorld: number;
  /** Pixel column and row of the tile's north-west corner. */
  left: number;
  top: number;
  values: Float32Array;
}

/** A cell less than a pixel wide or long cannot be told on the screen; from there on pixels show means. */
const LEAST_CELL_PX = 1;

/** Whether cells are drawn one by one at a zoom (else pixels are means). The same for every tile of a log, so seams agree. */
export function drawsSingleCells(index: TileIndex, z: number, size: number): boolean {
  const pixelsPerM = index.worldPerM * 2 ** z * size;
  return Math.min(index.narrowestRowM, index.medianCellLengthM) * pixelsPerM >= LEAST_CELL_PX;
}

/**
 * One tile of a channel: `size` x `size` values from the north-west corner, row by row; NaN where nothing was logged.
 * Close up a pixel carries the reading of the cell its middle lies in (of two, the one logged later); far out the mean of
 * the readings it covers, weighted by the distance each stands for. Works in whole-zoom pixel numbers, so neighbouring
 * tiles agree to the bit.
 */
export function rasteriseTile(index: TileIndex, channel: DrawnChannel, request: TileRequest): Float32Array {
  const { z, y, size } = request;
  const values = new Float32Array(size * size).fill(NaN);
  const single = drawsSingleCells(index, z, size);
  if (!single && channel.codeCount) return rasteriseCodes(index, channel, { request, codeCount: channel.codeCount });
  const weights = single ? null : new Float64Array(size * size);
  const sums = single ? null : new Float64Array(size * size);
  for (const x of columnsOf(index, request)) {
    const canvas: TileCanvas = { size, pixelsPerWorld: 2 ** z * size, left: x * size, top: y * size, values };
    if (weights && sums)
      forEachCell(index, channel, canvas, (corners, value, lengthM) =>
        accumulateCell({ canvas, corners, value, lengthM, weights, sums, keepsLeast: channel.isCode === true }),
      );
    else forEachCell(index, channel, canvas, (corners, value) => fillCell(canvas, corners, value));
  }
  if (weights && sums) writeMeans(values, sums, weights);
  return values;
}

/** A tile of names, far out: distance is added up name by name. */
function rasteriseCodes(
  index: TileIndex,
  channel: DrawnChannel,
  { request, codeCount }: { request: TileRequest; codeCount: number },
): Float32Array {
  const { z, y, size } = request;
  const pixels = size * size;
  const values = new Float32Array(pixels).fill(NaN);
  const sums = new Float64Array(pixels);
  const byCode = Array.from({ length: codeCount }, () => new Float64Array(pixels));
  for (const x of columnsOf(index, request)) {
    const canvas: TileCanvas = { size, pixelsPerWorld: 2 ** z * size, left: x * size, top: y * size, values };
    forEachCell(index, channel, canvas, (corners, value, lengthM) => {
      const weights = byCode[value - 1];
      if (weights) accumulateCell({ canvas, corners, value, lengthM, weights, sums, keepsLeast: false });
    });
  }
  for (let pixel = 0; pixel < pixels; pixel += 1) values[pixel] = heaviestCode(byCode, pixel);
  return values;
}

/** The name of the greatest weight at a place, the lower of two alike; NaN where there is none. */
export function heaviestCode(byCode: readonly ArrayLike<number>[], at: number): number {
  let best = NaN;
  let most = 0;
  byCode.forEach((weights, index) => {
    if (weights[at]! > most) [best, most] = [index + 1, weights[at]!];
  });
  return best;
}

/** The tile's column and, for a log over the antimeridian, the same column one turn of the globe away. */
function columnsOf(index: TileIndex, { z, x }: TileRequest): number[] {
  const count = 2 ** z;
  let least = Infinity;
  let greatest = -Infinity;
  for (let at = 0; at < index.chunkBounds.length; at += 4) {
    least = Math.min(least, index.chunkBounds[at]!);
    greatest = Math.max(greatest, index.chunkBounds[at + 1]!);
  }
  return [x - count, x, x + count].filter((column) => column < greatest * count && column + 1 > least * count);
}

function forEachCell(
  index: TileIndex,
  channel: DrawnChannel,
  canvas: TileCanvas,
  draw: (corners: Float64Array, value: number, lengthM: number) => void,
): void {
  const corners = new Float64Array(8);
  const { rows, chunkBounds } = index;
  for (let chunk = 0; chunk * 4 < chunkBounds.length; chunk += 1) {
    if (!chunkMeets(chunkBounds, chunk * 4, canvas)) continue;
    const end = Math.min(index.records, (chunk + 1) * CHUNK_RECORDS);
    for (let record = chunk * CHUNK_RECORDS; record < end; record += 1) {
      if (index.previousFrame[record]! < 0) continue;
      for (let row = 0; row < rows; row += 1) {
        const value = channel.values[channel.perRow ? record * channel.rows + row : record * channel.rows]!;
        if (Number.isNaN(value) || (channel.perRow && row >= channel.rows)) continue;
        writeCellCorners(index, record, row, corners);
        draw(corners, value, index.cellLengthM[record * rows + row]!);
      }
    }
  }
}

// kernel: whether a chunk's box touches the tile.
function chunkMeets(bounds: Float64Array, at: number, { pixelsPerWorld, left, top, size }: TileCanvas): boolean {
  return (
    bounds[at]! * pixelsPerWorld <= left + size &&
    bounds[at + 1]! * pixelsPerWorld >= left &&
    bounds[at + 2]! * pixelsPerWorld <= top + size &&
    bounds[at + 3]! * pixelsPerWorld >= top
  );
}

function writeMeans(values: Float32Array, sums: Float64Array, weights: Float64Array): void {
  for (let pixel = 0; pixel < values.length; pixel += 1) {
    if (weights[pixel]! > 0) values[pixel] = sums[pixel]! / weights[pixel]!;
  }
}
