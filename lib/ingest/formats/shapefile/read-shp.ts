import { stopReading } from "@/lib/ingest/ingest-error";
import { measureRings, meanOfPoints, midpointOfLine, type Centre } from "@/lib/ingest/records/shape-centre";

/** What a record's shape is, and so where its reading stands: at the point, the centre of the area, halfway along the line. */
export type ShapeKind = "point" | "points" | "line" | "area";

/** Positions of a shapefile, one a record, in file order; NaN for a null shape. */
export interface ShapePoints {
  kind: ShapeKind;
  x: Float64Array;
  y: Float64Array;
  /** Of areas: what each covers, in square units of the coordinates; null for other shapes. */
  area: Float64Array | null;
  /** The file ends before the length its header states. */
  isCutShort: boolean;
}

const HEADER_BYTES = 100;
const FILE_CODE = 9994;
/** Plain, with height (Z) and with measure (M): x and y stand in the same places in all three. */
const KINDS: Record<number, ShapeKind | undefined> = {
  1: "point",
  11: "point",
  21: "point",
  3: "line",
  13: "line",
  23: "line",
  5: "area",
  15: "area",
  25: "area",
  8: "points",
  18: "points",
  28: "points",
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
  const kind = type === 0 ? "point" : KINDS[type];
  if (!kind) {
    stopReading(
      "not-points",
      `"${name}" holds shapes of type ${type}. A log is made of points, lines or areas, one a record.`,
    );
  }
  const statedBytes = view.getInt32(24) * 2;
  const capacity = Math.ceil((bytes.length - HEADER_BYTES) / 12);
  const x = new Float64Array(capacity);
  const y = new Float64Array(capacity);
  const area = kind === "area" ? new Float64Array(capacity) : null;
  const { count, end } = readShapes(view, { x, y, area, kind }, name);
  return {
    kind,
    x: x.subarray(0, count),
    y: y.subarray(0, count),
    area: area ? area.subarray(0, count) : null,
    isCutShort: end < statedBytes || bytes.length < statedBytes,
  };
}

function readShapes(
  view: DataView,
  shapes: Pick<ShapePoints, "x" | "y" | "area" | "kind">,
  name: string,
): { count: number; end: number } {
  let at = HEADER_BYTES;
  let count = 0;
  while (at + 12 <= view.byteLength) {
    const contentBytes = view.getInt32(at + 4) * 2;
    const next = at + 8 + contentBytes;
    if (contentBytes < 4 || next > view.byteLength) break;
    const type = view.getInt32(at + 8, true);
    if (shapes.area) shapes.area[count] = NaN;
    if (type === 0) shapes.x[count] = shapes.y[count] = NaN;
    else if (KINDS[type] !== shapes.kind) stopAtRecord(name, count, `is of another type (${type}) than the file`);
    else if (shapes.kind === "point" && contentBytes >= 20) {
      shapes.x[count] = view.getFloat64(at + 12, true);
      shapes.y[count] = view.getFloat64(at + 20, true);
    } else {
      const { centre, area } =
        readPlace(view, { at: at + 8, end: next, kind: shapes.kind }) ?? stopAtRecord(name, count, DAMAGED);
      shapes.x[count] = centre[0];
      shapes.y[count] = centre[1];
      if (shapes.area) shapes.area[count] = area;
    }
    count++;
    at = next;
  }
  return { count, end: at };
}

const DAMAGED = "is shorter than its own counts say";

function stopAtRecord(name: string, count: number, why: string): never {
  stopReading("shapefile-damaged", `Record ${count + 1} of "${name}" ${why}. Export the log again.`, {
    line: count + 1,
  });
}

const BOX_END = 36;

/** Centre and area of a shape of several points: type, box, counts, starts of the parts (not for multipoints), points. Null when damaged. */
function readPlace(
  view: DataView,
  { at, end, kind }: { at: number; end: number; kind: ShapeKind },
): { centre: Centre; area: number } | null {
  if (kind === "point" || at + BOX_END + 8 > end) return null;
  const parts = kind === "points" ? 0 : view.getInt32(at + BOX_END, true);
  const countAt = kind === "points" ? at + BOX_END : at + BOX_END + 4;
  const points = view.getInt32(countAt, true);
  const partsAt = countAt + 4;
  const pointsAt = partsAt + 4 * parts;
  if (parts < 0 || points < 0 || pointsAt + 16 * points > end) return null;
  const flat = Float64Array.from({ length: points * 2 }, (_, i) => view.getFloat64(pointsAt + 8 * i, true));
  if (kind === "points") return { centre: meanOfPoints(flat), area: NaN };
  const starts = Array.from({ length: parts }, (_, i) => view.getInt32(partsAt + 4 * i, true));
  if (starts.some((start, i) => start < 0 || start > points || start < (starts[i - 1] ?? 0))) return null;
  const pieces = starts.map((start, i) => flat.subarray(2 * start, 2 * (starts[i + 1] ?? points)));
  if (kind === "area") return measureRings(pieces);
  const longest = pieces.reduce((a, b) => (b.length > a.length ? b : a), new Float64Array(0));
  return { centre: midpointOfLine(longest), area: NaN };
}
