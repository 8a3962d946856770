import type { MultiPolygon, Polygon } from "geojson";
import { findBoundaryFault } from "@/lib/geo/find-boundary-fault";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { fail, succeed, type Result } from "@/lib/result";
import { Boundary } from "@/lib/schemas/geometry";

export interface ReadBoundary {
  geometry: Polygon | MultiPolygon;
  areaM2: number;
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
  const geometry = joinPolygons(parts);
  const fault = findBoundaryFault(geometry);
  if (fault) return fail(`The boundary’s ${fault.place} ${fault.message}.`);
  return succeed({ geometry, areaM2: geodesicAreaM2(geometry) });
}
