import { stopReading } from "@/lib/ingest/ingest-error";

/** Positions of a point shapefile, in file order; NaN for a null shape. */
export interface ShapePoints {
  x: Float64Array;
  y: Float64Array;
  /** The file ends before the length its header states. */
  isCutShort: boolean;
}

const HEADER_BYTES = 100;
const FILE_CODE = 9994;
/** Point, PointZ, PointM: x and y stand first in each. */
const POINT_TYPES: ReadonlySet<number> = new Set([1, 11, 21]);
const TYPE_NAMES: Record<number, string> = {
  3: "lines",
  5: "polygons",
  8: "multipoints",
  13: "lines",
  15: "polygons",
  18: "multipoints",
  23: "lines",
  25: "polygons",
  28: "multipoints",
  31: "patches",
};

/** Layout: Esri Shapefile Technical Description, July 1998. Headers big-endian, contents little-endian, lengths in 16-bit words. */
export function readShp(bytes: Uint8Array, name: string): ShapePoints {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (bytes.length < HEADER_BYTES || view.getInt32(0) !== FILE_CODE || view.getInt32(28, true) !== 1000) {
    stopReading(
      "shapefile-damaged",
      `"${name}" does not begin as a shapefile does (file code 9994, version 1000). Export the log again.`,
    );
  }
  const type = view.getInt32(32, true);
  if (type !== 0 && !POINT_TYPES.has(type)) {
    stopReading(
      "not-points",
      `"${name}" holds ${TYPE_NAMES[type] ?? `shapes of type ${type}`}. A log is made of points, one a record; boundaries and plots are uploaded elsewhere.`,
    );
  }
  const statedBytes = view.getInt32(24) * 2;
  const capacity = Math.ceil((bytes.length - HEADER_BYTES) / 12);
  const x = new Float64Array(capacity);
  const y = new Float64Array(capacity);
  const { count, end } = readPoints(view, { x, y }, name);
  return {
    x: x.subarray(0, count),
    y: y.subarray(0, count),
    isCutShort: end < statedBytes || bytes.length < statedBytes,
  };
}

function readPoints(
  view: DataView,
  points: { x: Float64Array; y: Float64Array },
  name: string,
): { count: number; end: number } {
  let at = HEADER_BYTES;
  let count = 0;
  while (at + 12 <= view.byteLength) {
    const contentBytes = view.getInt32(at + 4) * 2;
    const next = at + 8 + contentBytes;
    if (contentBytes < 4 || next > view.byteLength) break;
    const type = view.getInt32(at + 8, true);
    const isPoint = POINT_TYPES.has(type) && contentBytes >= 20;
    if (!isPoint && type !== 0) {
      stopReading(
        "shapefile-damaged",
        `Record ${count + 1} of "${name}" is no point (type ${type}). Export the log again.`,
        {
          line: count + 1,
        },
      );
    }
    points.x[count] = isPoint ? view.getFloat64(at + 12, true) : NaN;
    points.y[count] = isPoint ? view.getFloat64(at + 20, true) : NaN;
    count++;
    at = next;
  }
  return { count, end: at };
}
