import type { Position } from "geojson";

/** Polygons found in anything that looks like GeoJSON, and the kinds of geometry that were passed over. */
export interface CollectedPolygons {
  polygons: Position[][][];
  passedOver: string[];
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null;
}

function listIn(value: unknown): unknown[] {
  return Array.isArray(value) ? value : [];
}

function isPosition(value: unknown): value is Position {
  return Array.isArray(value) && value.length >= 2 && value.every((part) => typeof part === "number");
}

/** A ring without heights, closed when the file left that out (KML writers do). */
function readRing(value: unknown): Position[] {
  const ring = listIn(value)
    .filter(isPosition)
    .map((position) => position.slice(0, 2));
  const [first, last] = [ring[0], ring.at(-1)];
  return first && last && String(first) !== String(last) ? [...ring, first] : ring;
}

function readPolygon(value: unknown): Position[][] {
  return listIn(value).map(readRing);
}

/** Walks features, collections and geometries; unknown input gives no polygons rather than an error. */
export function collectPolygons(value: unknown, depth = 0): CollectedPolygons {
  const found: CollectedPolygons = { polygons: [], passedOver: [] };
  if (!isRecord(value) || depth > 8) return found;
  if (value.type === "Polygon") return { ...found, polygons: [readPolygon(value.coordinates)] };
  if (value.type === "MultiPolygon") return { ...found, polygons: listIn(value.coordinates).map(readPolygon) };
  const inner = [...listIn(value.features), ...listIn(value.geometries), ...(value.geometry ? [value.geometry] : [])];
  if (inner.length === 0 && typeof value.type === "string") found.passedOver.push(value.type);
  for (const part of inner) {
    const { polygons, passedOver } = collectPolygons(part, depth + 1);
    found.polygons.push(...polygons);
    found.passedOver.push(...passedOver);
  }
  return found;
}
