import { BoundaryFileFailure, type BoundaryFileError } from "@/lib/fields/boundary-file-error";
import { collectPolygons } from "@/lib/fields/collect-polygons";
import type { ClosedTracks } from "@/lib/fields/close-tracks";
import { readBoundaryShapefile } from "@/lib/fields/read-boundary-shapefile";
import { readPlaceXml } from "@/lib/fields/read-place-xml";
import { fail, succeed, type Result } from "@/lib/result";

/** Not yet checked against `Boundary`: that names the position that breaks a rule. */
export interface RawBoundary {
  type: "MultiPolygon" | "Polygon";
  coordinates: unknown[];
}

function isZip(bytes: Uint8Array): boolean {
  return bytes[0] === 0x50 && bytes[1] === 0x4b;
}

function decodeText(bytes: Uint8Array): string {
  const isUtf16 = bytes[0] === 0xff && bytes[1] === 0xfe;
  return new TextDecoder(isUtf16 ? "utf-16le" : "utf-8").decode(bytes).trim();
}

function parseGeoJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (cause) {
    const reason = cause instanceof Error ? cause.message : "not JSON";
    throw new BoundaryFileFailure("file-damaged", `The file is not valid GeoJSON: ${reason}`);
  }
}

function parseFile(bytes: Uint8Array): ClosedTracks {
  if (bytes.length === 0) throw new BoundaryFileFailure("empty-file", "The file is empty.");
  if (isZip(bytes)) return { places: readBoundaryShapefile(bytes), notes: [] };
  const text = decodeText(bytes);
  if (text.startsWith("{")) return { places: parseGeoJson(text), notes: [] };
  if (text.startsWith("<")) return readPlaceXml(text);
  throw new BoundaryFileFailure(
    "unknown-file-kind",
    "A boundary is GeoJSON, KML, GPX or a zipped shapefile; this is none.",
  );
}

/** One polygon stays one; several become one boundary of several parts. @throws BoundaryFileFailure without any */
export function toRawBoundary(value: unknown): RawBoundary {
  const { polygons, passedOver } = collectPolygons(value);
  const [first] = polygons;
  if (!first) {
    const kinds = [...new Set(passedOver)].join(", ") || "nothing";
    throw new BoundaryFileFailure("no-polygon", `There is no polygon in it; found: ${kinds}.`);
  }
  return polygons.length === 1
    ? { type: "Polygon", coordinates: first }
    : { type: "MultiPolygon", coordinates: polygons };
}

export interface BoundaryFile {
  boundary: RawBoundary;
  /** What was done to what the file holds, in plain sentences. */
  notes: string[];
}

/** The polygons of a GeoJSON, KML, GPX or zipped shapefile, told apart by their bytes and not by a name. */
export function readBoundaryFile(bytes: Uint8Array): Result<BoundaryFile, BoundaryFileError> {
  try {
    const { places, notes } = parseFile(bytes);
    return succeed({ boundary: toRawBoundary(places), notes });
  } catch (error) {
    if (error instanceof BoundaryFileFailure) return fail(error.error);
    throw error;
  }
}
