import { readHead, type ByteSource } from "@/lib/ingest/byte-source";
import { FeatureSplitter } from "@/lib/ingest/formats/geojson/split-features";
import { stopReading } from "@/lib/ingest/ingest-error";
import { measureRings, meanOfPoints, midpointOfLine, type Centre } from "@/lib/ingest/records/shape-centre";

/** A point feature: longitude and latitude as they stand (RFC 7946 order), NaN without a geometry. */
export interface PointFeature {
  /** From 1. */
  number: number;
  x: number;
  y: number;
  /** Of an area: what it covers, in square units of the coordinates; NaN for other shapes. */
  area: number;
  hasGeometry: boolean;
  /** What the position was made from, where the geometry is no single point. */
  madeFrom: "points" | "line" | "area" | null;
  properties: Record<string, unknown>;
}

/** Bytes of one feature and its number, from 1. */
export interface FeatureBytes {
  number: number;
  bytes: Uint8Array;
}

const RECORD_SEPARATOR = 0x1e;
const HEAD_BYTES = 65_536;

/**
 * Whether a text is a sequence of GeoJSON texts instead of one: by RFC 8142 each begins with a record separator; the same
 * without separators, one feature a line, is common too.
 */
async function isSequence(source: ByteSource): Promise<boolean> {
  const head = await readHead(source, HEAD_BYTES);
  const first = head.find((byte) => byte === RECORD_SEPARATOR || byte > 32);
  if (first === RECORD_SEPARATOR) return true;
  const splitter = new FeatureSplitter("sequence");
  const [text] = splitter.push(head);
  return text !== undefined && isFeature(decoder.decode(text));
}

function isFeature(text: string): boolean {
  try {
    const value: unknown = JSON.parse(text);
    return isObject(value) && value.type === "Feature";
  } catch {
    return false;
  }
}

/** Features of a GeoJSON text, or of a sequence of texts, as bytes, one at a time. Stops with `json-damaged` or `not-a-log`. */
export async function* readFeatureBytes(source: ByteSource): AsyncGenerator<FeatureBytes[]> {
  const isMany = await isSequence(source);
  const splitter = new FeatureSplitter(isMany ? "sequence" : "collection");
  let number = 0;
  for await (const chunk of source.stream()) {
    const features: FeatureBytes[] = [];
    for (const text of splitter.push(chunk)) {
      for (const bytes of isMany ? openText(text) : [text]) features.push({ number: ++number, bytes });
    }
    yield features;
  }
  if (!splitter.isComplete) {
    stopReading(
      "json-damaged",
      `"${source.name}" ends in the middle, after feature ${number}: it was cut short or a bracket is missing. Export or upload it again.`,
      { line: number },
    );
  }
  if (number === 0 && !splitter.sawCollection) {
    stopReading(
      "not-a-log",
      `"${source.name}" is JSON, but no GeoJSON FeatureCollection. Export the log as GeoJSON points and upload that.`,
    );
  }
}

/** A text of a sequence may be a whole collection (RFC 8142 section 2). */
function openText(text: Uint8Array): Uint8Array[] {
  const inner = new FeatureSplitter("collection");
  const features = [...inner.push(text)];
  return inner.sawCollection ? features : [text];
}

const decoder = new TextDecoder("utf-8");

/** A feature read by JSON.parse. Stops with `json-damaged` or `not-points`. */
export function parsePoint({ number, bytes }: FeatureBytes): PointFeature {
  return toPoint(parseFeature(decoder.decode(bytes), number), number);
}

function parseFeature(text: string, number: number): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return stopReading("json-damaged", `Feature ${number} is not valid JSON. Export the log again.`, { line: number });
  }
}

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}

function toPoint(feature: unknown, number: number): PointFeature {
  const record = isObject(feature) ? feature : {};
  const properties = isObject(record.properties) ? record.properties : {};
  if (!isObject(record.geometry)) {
    return { number, x: NaN, y: NaN, area: NaN, hasGeometry: false, madeFrom: null, properties };
  }
  const { type, coordinates } = record.geometry;
  const placed = typeof type === "string" ? PLACES[type] : undefined;
  if (!placed || !Array.isArray(coordinates)) {
    stopReading(
      "not-points",
      `Feature ${number} is a ${typeof type === "string" ? type : "shape without a type"}. A log is made of points, lines or areas, one a record; boundaries and plots are uploaded elsewhere.`,
      { line: number },
    );
  }
  const { centre, area } = placed.place(coordinates);
  return { number, x: centre[0], y: centre[1], area, hasGeometry: true, madeFrom: placed.madeFrom, properties };
}

interface Place {
  madeFrom: PointFeature["madeFrom"];
  place(coordinates: readonly unknown[]): { centre: Centre; area: number };
}

const withoutArea = (centre: Centre) => ({ centre, area: NaN });

const PLACES: Record<string, Place | undefined> = {
  Point: { madeFrom: null, place: ([x, y]) => withoutArea([asNumber(x), asNumber(y)]) },
  MultiPoint: { madeFrom: "points", place: (points) => withoutArea(meanOfPoints(flatten(points))) },
  LineString: { madeFrom: "line", place: (points) => withoutArea(midpointOfLine(flatten(points))) },
  MultiLineString: {
    madeFrom: "line",
    place: (lines) => {
      const longest = asLists(lines)
        .map(flatten)
        .reduce((a, b) => (b.length > a.length ? b : a), []);
      return withoutArea(midpointOfLine(longest));
    },
  },
  Polygon: { madeFrom: "area", place: (rings) => measureRings(asLists(rings).map(flatten)) },
  MultiPolygon: {
    madeFrom: "area",
    place: (areas) => measureRings(asLists(areas).flatMap((rings) => asLists(rings).map(flatten))),
  },
};

function asLists(values: readonly unknown[]): (readonly unknown[])[] {
  return values.filter((value): value is unknown[] => Array.isArray(value));
}

/** Positions as x, y, x, y, …; heights are left out (RFC 7946 section 3.1.1). */
function flatten(positions: readonly unknown[]): number[] {
  return asLists(positions).flatMap(([x, y]) => [asNumber(x), asNumber(y)]);
}

function asNumber(value: unknown): number {
  return typeof value === "number" ? value : NaN;
}
