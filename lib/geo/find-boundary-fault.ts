import { kinks } from "@turf/turf";
import type { Position } from "geojson";
import type { Boundary } from "@/lib/schemas/geometry";

/** Corners of one ring above which looking for crossings would take too long (every edge meets every other). */
const MOST_CORNERS = 20_000;

export interface BoundaryFault {
  /** `Polygon` ring or `MultiPolygon` part and ring, in words. */
  place: string;
  message: string;
}

function isPlain(ring: Position[]): BoundaryFault["message"] | null {
  const corners = new Set(ring.map((position) => `${position[0]},${position[1]}`));
  if (corners.size < 3) return "has fewer than three different corners";
  return ring.length > MOST_CORNERS ? `has ${ring.length} corners; at most ${MOST_CORNERS} are taken` : null;
}

function findRingFault(ring: Position[]): string | null {
  const fault = isPlain(ring);
  if (fault) return fault;
  const [first] = kinks({ type: "Polygon", coordinates: [ring] }).features;
  if (!first) return null;
  const [longitude = NaN, latitude = NaN] = first.geometry.coordinates;
  return `crosses itself at longitude ${longitude.toFixed(6)}, latitude ${latitude.toFixed(6)}`;
}

/**
 * The first thing that makes a boundary no area: a ring that crosses itself, or has too few or too many corners.
 * Null when there is none. Cost O(n²) in the corners of a ring.
 */
export function findBoundaryFault(boundary: Boundary): BoundaryFault | null {
  const parts = boundary.type === "Polygon" ? [boundary.coordinates] : boundary.coordinates;
  for (const [partIndex, rings] of parts.entries()) {
    for (const [ringIndex, ring] of rings.entries()) {
      const message = findRingFault(ring);
      const part = boundary.type === "MultiPolygon" ? `part ${partIndex + 1}, ` : "";
      if (message) return { place: `${part}ring ${ringIndex + 1}`, message };
    }
  }
  return null;
}
