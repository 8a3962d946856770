import { toWorld } from "@/lib/tiles/tile-address";
import { CHUNK_RECORDS, type TileIndex, writeCellCorners } from "@/lib/tiles/tile-index";

/** The record and row (from 1) whose cell lies under a place, the later one where two passes overlap; null off the ground worked. */
export function locateReading(
  index: TileIndex,
  longitude: number,
  latitude: number,
): { record: number; row: number } | null {
  const [worldX, y] = toWorld(longitude, latitude);
  for (let chunk = index.chunkBounds.length / 4 - 1; chunk >= 0; chunk -= 1) {
    for (const x of [worldX, worldX - 1, worldX + 1]) {
      if (!chunkHolds(index.chunkBounds, chunk * 4, x, y)) continue;
      const found = locateInChunk(index, chunk, x, y);
      if (found) return found;
    }
  }
  return null;
}

// kernel: x and y in world units.
function chunkHolds(bounds: Float64Array, at: number, x: number, y: number): boolean {
  return x >= bounds[at]! && x <= bounds[at + 1]! && y >= bounds[at + 2]! && y <= bounds[at + 3]!;
}

// kernel: x and y in world units.
function locateInChunk(index: TileIndex, chunk: number, x: number, y: number): { record: number; row: number } | null {
  const corners = new Float64Array(8);
  const first = chunk * CHUNK_RECORDS;
  for (let record = Math.min(index.records, first + CHUNK_RECORDS) - 1; record >= first; record -= 1) {
    if (index.previousFrame[record]! < 0) continue;
    for (let row = 0; row < index.rows; row += 1) {
      writeCellCorners(index, record, row, corners);
      if (cellHolds(corners, x, y)) return { record, row: row + 1 };
    }
  }
  return null;
}

// kernel: even-odd rule, with the same edge rule as the rasteriser.
function cellHolds(corners: Float64Array, x: number, y: number): boolean {
  let inside = false;
  for (let i = 0; i < 8; i += 2) {
    const j = (i + 2) & 7;
    const ay = corners[i + 1]!;
    const by = corners[j + 1]!;
    if (ay > y === by > y) continue;
    const crossing = corners[i]! + ((y - ay) / (by - ay)) * (corners[j]! - corners[i]!);
    if (crossing > x) inside = !inside;
  }
  return inside;
}
