import type { ByteSource } from "@/lib/ingest/byte-source";
import { FeatureSplitter } from "@/lib/ingest/formats/geojson/split-features";
import { stopReading } from "@/lib/ingest/ingest-error";

/** A point feature: longitude and latitude as they stand (RFC 7946 order), NaN without a geometry. */
export interface PointFeature {
  /** From 1. */
  number: number;
  x: number;
  y: number;
  hasGeometry: boolean;
  properties: Record<string, unknown>;
}

/** Bytes of one feature and its number, from 1. */
export interface FeatureBytes {
  number: number;
  bytes: Uint8Array;
}

/** Features of a GeoJSON text as bytes, one at a time. Stops with `json-damaged` or `not-a-log`. */
export async function* readFeatureBytes(source: ByteSource): AsyncGenerator<FeatureBytes[]> {
  const splitter = new FeatureSplitter();
  let number = 0;
  for await (const chunk of source.stream()) {
    const features: FeatureBytes[] = [];
    for (const bytes of splitter.push(chunk)) features.push({ number: ++number, bytes });
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
  if (!isObject(record.geometry)) return { number, x: NaN, y: NaN, hasGeometry: false, properties };
  const { type, coordinates } = record.geometry;
  const position: unknown = type === "MultiPoint" && Array.isArray(coordinates) ? coordinates[0] : coordinates;
  if (type !== "Point" && !(type === "MultiPoint" && Array.isArray(coordinates) && coordinates.length === 1)) {
    stopReading(
      "not-points",
      `Feature ${number} is a ${typeof type === "string" ? type : "shape without a type"}. A log is made of points, one a record; boundaries and plots are uploaded elsewhere.`,
      { line: number },
    );
  }
  const [x, y]: unknown[] = Array.isArray(position) ? position : [];
  return { number, x: asNumber(x), y: asNumber(y), hasGeometry: true, properties };
}

function asNumber(value: unknown): number {
  return typeof value === "number" ? value : NaN;
}
