import { featureCollection, polygon, union } from "@turf/turf";
import type { MultiPolygon, Polygon, Position } from "geojson";
import type { LocalPlane } from "@/lib/geo/local-plane";

/**
 * Rings of a boundary in a plane, metres. Parts that a file cut at the antimeridian (RFC 7946 3.1.9) are joined again: the cut
 * is no edge of the field.
 */
export function boundaryInPlane(boundary: Polygon | MultiPolygon, plane: LocalPlane): [number, number][][] {
  const polygons = boundary.type === "Polygon" ? [boundary.coordinates] : boundary.coordinates;
  const placed = polygons.map((rings) =>
    rings.map((ring) => ring.map((corner) => plane.toPlane(corner[0] ?? NaN, corner[1] ?? NaN))),
  );
  return polygons.length > 1 && polygons.flat(2).some(isOnAntimeridian) ? joinParts(placed) : placed.flat();
}

function isOnAntimeridian([longitude = NaN]: Position): boolean {
  return Math.abs(Math.abs(longitude) - 180) < 1e-9;
}

/** Corners of two parts on the cut differ by rounding: a millimetre grid brings them together. */
const JOIN_GRID_M = 0.001;

function joinParts(parts: [number, number][][][]): [number, number][][] {
  const snap = (value: number) => Math.round(value / JOIN_GRID_M) * JOIN_GRID_M;
  const features = parts.map((rings) =>
    polygon(rings.map((ring) => ring.map(([east, north]) => [snap(east), snap(north)]))),
  );
  const joined = union(featureCollection(features))?.geometry;
  if (!joined) return parts.flat();
  const rings = joined.type === "Polygon" ? joined.coordinates : joined.coordinates.flat();
  return rings as [number, number][][];
}
