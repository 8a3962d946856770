import { featureCollection, polygon, union } from "@turf/turf";
import type { Position } from "geojson";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import type { Boundary } from "@/lib/schemas/geometry";

/** Share of the area under which two parts do not overlap but touch, with the dust of rounded corners between them. */
const TOUCHING = 1e-7;

export interface MergedParts {
  boundary: Boundary;
  /** Ground that lay in two parts or more, counted once now; 0 where none did. */
  overlapM2: number;
}

/**
 * A boundary whose parts overlap, as one that holds each place once (union by turf); the boundary itself where none do.
 * Its rings must not cross themselves. Cost of a union: O(n log n) in all corners.
 */
export function mergeOverlappingParts(boundary: Boundary): MergedParts {
  if (boundary.type === "Polygon" || boundary.coordinates.length < 2) return { boundary, overlapM2: 0 };
  if (boundary.coordinates.flat().some(spansGlobe)) return { boundary, overlapM2: 0 };
  const merged = union(featureCollection(boundary.coordinates.map((rings) => polygon(rings))));
  if (!merged) return { boundary, overlapM2: 0 };
  const sumM2 = geodesicAreaM2(boundary);
  const overlapM2 = sumM2 - geodesicAreaM2(merged.geometry);
  return overlapM2 > sumM2 * TOUCHING ? { boundary: merged.geometry, overlapM2 } : { boundary, overlapM2: 0 };
}

/** Across the antimeridian degrees jump, and what meets there cannot be told from degrees alone. */
function spansGlobe(ring: readonly Position[]): boolean {
  let [west, east] = [Infinity, -Infinity];
  for (const [longitude = NaN] of ring) {
    west = Math.min(west, longitude);
    east = Math.max(east, longitude);
  }
  return east - west > 180;
}

/** In square metres, the unit in which boundaries are stored. */
export function sayOverlap(overlapM2: number): string {
  return `Parts of the boundary overlap by ${Math.round(overlapM2).toLocaleString("en-US")} m2; that ground is counted once.`;
}
