/** Records a chunk holds; small enough to skip well by its box, large enough that the boxes are few. */
export const CHUNK_RECORDS = 32;

/**
 * A log laid out for fast drawing. A *frame* is the machine at one moment: where the implement's centre line meets the
 * line of rows, and one metre to its right and ahead, all in world units (see tile-address). Frames `0 .. records - 1`
 * are the records; after them comes one made-up frame for the start of each pass.
 */
export interface TileIndex {
  records: number;
  rows: number;
  originX: Float64Array;
  originY: Float64Array;
  rightX: Float64Array;
  rightY: Float64Array;
  forwardX: Float64Array;
  forwardY: Float64Array;
  /** Per record: the frame where its cells begin, or -1 where it has none (in no pass, no position, alone in its pass). */
  previousFrame: Int32Array;
  rowOffsetM: Float64Array;
  rowForwardM: Float64Array;
  rowWidthM: Float64Array;
  /** Distance each row travelled in this record's cell, metres: `cellLengthM[record * rows + row]`; 0 without a cell. */
  cellLengthM: Float32Array;
  /** Four numbers a chunk: least and greatest world x, least and greatest world y; least x above greatest where empty. */
  chunkBounds: Float64Array;
  /** The narrowest row and the median length of a cell: what decides from which zoom cells are drawn one by one. */
  narrowestRowM: number;
  medianCellLengthM: number;
  /** World units a metre in the middle of the log (mean of east and north). */
  worldPerM: number;
}

/** West, south, east, north of everything drawn, in degrees; west > east across the antimeridian. Null for an empty log. */
export type TileBounds = [west: number, south: number, east: number, north: number];

// kernel: writes the 8 corner numbers of one reading's cell, in order round it, into `corners`.
export function writeCellCorners(index: TileIndex, record: number, row: number, corners: Float64Array): void {
  const offset = index.rowOffsetM[row]!;
  const ahead = index.rowForwardM[row]!;
  const half = index.rowWidthM[row]! / 2;
  const left = offset - half;
  const right = offset + half;
  let frame = index.previousFrame[record]!;
  for (let end = 0; end < 2; end += 1) {
    const x = index.originX[frame]! + ahead * index.forwardX[frame]!;
    const y = index.originY[frame]! + ahead * index.forwardY[frame]!;
    const rightX = index.rightX[frame]!;
    const rightY = index.rightY[frame]!;
    // Round the cell: left and right edge at its start, then right and left edge at its end.
    const first = end === 0 ? left : right;
    const second = end === 0 ? right : left;
    corners[end * 4] = x + first * rightX;
    corners[end * 4 + 1] = y + first * rightY;
    corners[end * 4 + 2] = x + second * rightX;
    corners[end * 4 + 3] = y + second * rightY;
    frame = record;
  }
}
