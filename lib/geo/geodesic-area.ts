import geodesic from "geographiclib-geodesic";
import type { MultiPolygon, Polygon, Position } from "geojson";

/** Area of one ring on the WGS 84 ellipsoid, m2, whichever way round it is given; 0 under three corners. */
function ringAreaM2(ring: Position[]): number {
  const polygon = geodesic.Geodesic.WGS84.Polygon(false);
  const first = ring[0];
  const last = ring[ring.length - 1];
  const closed = ring.length > 1 && first !== undefined && last?.[0] === first[0] && last?.[1] === first[1];
  const corners = closed ? ring.slice(0, -1) : ring;
  if (corners.length < 3) return 0;
  for (const corner of corners) polygon.AddPoint(corner[1] ?? NaN, corner[0] ?? NaN);
  return Math.abs(polygon.Compute(false, true).area ?? NaN);
}

function polygonAreaM2(rings: Position[][]): number {
  const [outer = [], ...holes] = rings;
  return holes.reduce((area, hole) => area - ringAreaM2(hole), ringAreaM2(outer));
}

/**
 * Area on the WGS 84 ellipsoid, m2 (Karney 2013). Holes are taken off; winding does not matter; a ring may cross the
 * antimeridian. A sphere would be off by up to 0.6 %.
 */
export function geodesicAreaM2(geometry: Polygon | MultiPolygon): number {
  if (geometry.type === "Polygon") return polygonAreaM2(geometry.coordinates);
  return geometry.coordinates.reduce((area, rings) => area + polygonAreaM2(rings), 0);
}
