import type { MultiPolygon, Polygon } from "geojson";
import { findBoundaryFault } from "@/lib/geo/find-boundary-fault";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { mergeOverlappingParts, sayOverlap } from "@/lib/geo/merge-overlapping-parts";
import { fail, succeed, type Result } from "@/lib/result";
import { Boundary } from "@/lib/schemas/geometry";

export interface ReadBoundary {
  geometry: Polygon | MultiPolygon;
  areaM2: number;
  /** What was done to what was given, in plain sentences. */
  notes: string[];
}

/** Every polygon in a GeoJSON value: a geometry, a Feature, a collection of either. */
function collectPolygons(value: unknown): unknown[] {
  if (typeof value !== "object" || value === null) return [];
  const item = value as { type?: unknown; geometry?: unknown; features?: unknown; geometries?: unknown };
  if (item.type === "Feature") return collectPolygons(item.geometry);
  if (item.type === "FeatureCollection" && Array.isArray(item.features)) return item.features.flatMap(collectPolygons);
  if (item.type === "GeometryCollection" && Array.isArray(item.geometries)) {
    return item.geometries.flatMap(collectPolygons);
  }
  return item.type === "Polygon" || item.type === "MultiPolygon" ? [value] : [];
}

function joinPolygons(parts: Boundary[]): Polygon | MultiPolygon {
  const [first] = parts;
  if (parts.length === 1 && first) return first;
  const coordinates = parts.flatMap((part) => (part.type === "Polygon" ? [part.coordinates] : part.coordinates));
  return { type: "MultiPolygon", coordinates };
}

/** GeoJSON text to a boundary and its area, or words that say what is wrong and what to paste instead. */
export function readBoundaryText(text: string): Result<ReadBoundary, string> {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    return fail("This is not GeoJSON: it cannot be read as JSON. Paste the whole text of a .geojson file.");
  }
  const found = collectPolygons(value);
  if (found.length === 0) {
    return fail("There is no polygon in this GeoJSON. A boundary is a Polygon or MultiPolygon.");
  }
  const parts: Boundary[] = [];
  for (const candidate of found) {
    const parsed = Boundary.safeParse(candidate);
    if (!parsed.success)
      return fail(`This polygon cannot be a boundary: ${parsed.error.issues[0]?.message ?? "bad ring"}.`);
    parts.push(parsed.data);
  }
  return finishBoundary(joinPolygons(parts));
}

/** Parts that overlap made one, as the server does, with the area that the field will have. */
function finishBoundary(given: Polygon | MultiPolygon, notes: readonly string[] = []): Result<ReadBoundary, string> {
  const fault = findBoundaryFault(given);
  if (fault) return fail(`The boundary’s ${fault.place} ${fault.message}.`);
  const { boundary, overlapM2 } = mergeOverlappingParts(given);
  const said = overlapM2 === 0 ? [...notes] : [...notes, sayOverlap(overlapM2)];
  return succeed({ geometry: boundary, areaM2: geodesicAreaM2(boundary), notes: said });
}

/** A boundary file of any kind to a boundary and its area, or words that say what is wrong. The readers load when needed. */
export async function readBoundaryBytes(bytes: Uint8Array): Promise<Result<ReadBoundary, string>> {
  const { readBoundaryFile } = await import("@/lib/fields/read-boundary-file");
  const read = readBoundaryFile(bytes);
  if (!read.ok) return fail(read.error.message);
  const parsed = Boundary.safeParse(read.value.boundary);
  if (!parsed.success)
    return fail(`This polygon cannot be a boundary: ${parsed.error.issues[0]?.message ?? "bad ring"}.`);
  return finishBoundary(parsed.data, read.value.notes);
}
