import { kinks } from "@turf/turf";
import type { Position } from "geojson";
import { longitudeNear, unwrapPositions } from "@/lib/geo/cut-at-antimeridian";
import type { Boundary } from "@/lib/schemas/geometry";

/** Every edge of a ring meets every other: 8 000 corners take about a second, and nothing else runs meanwhile. */
const MOST_RING_CORNERS = 8_000;
const MOST_CORNERS = 20_000;

export interface BoundaryFault {
  /** `Polygon` ring or `MultiPolygon` part and ring, in words. */
  place: string;
  message: string;
}

/** Without corners that repeat the one before, as survey tools write them: they are no crossing. */
function dropRepeated(ring: Position[]): Position[] {
  return ring.filter((position, i) => i === 0 || position[0] !== ring[i - 1]![0] || position[1] !== ring[i - 1]![1]);
}

function findRingFault(ring: Position[]): string | null {
  // Crossing the antimeridian is no crossing of the ring's own.
  const corners = dropRepeated(unwrapPositions(ring));
  if (corners.length < 4) return "has fewer than three different corners";
  if (corners.length > MOST_RING_CORNERS) {
    return `has ${corners.length} corners; at most ${MOST_RING_CORNERS} are taken`;
  }
  const [first] = kinks({ type: "Polygon", coordinates: [corners] }).features;
  if (!first) return null;
  const [longitude = NaN, latitude = NaN] = first.geometry.coordinates;
  return `crosses itself at longitude ${longitudeNear(longitude, 0).toFixed(6)}, latitude ${latitude.toFixed(6)}`;
}

/**
 * The first thing that makes a boundary no area: a ring that crosses or touches itself, or has too few or too many
 * corners. Null when there is none. Cost O(n²) in the corners of a ring.
 */
export function findBoundaryFault(boundary: Boundary): BoundaryFault | null {
  const parts = boundary.type === "Polygon" ? [boundary.coordinates] : boundary.coordinates;
  const corners = parts.flat().reduce((sum, ring) => sum + ring.length, 0);
  if (corners > MOST_CORNERS) {
    return { place: "rings", message: `have ${corners} corners together; at most ${MOST_CORNERS} are taken` };
  }
  for (const [partIndex, rings] of parts.entries()) {
    for (const [ringIndex, ring] of rings.entries()) {
      const message = findRingFault(ring);
      const part = boundary.type === "MultiPolygon" ? `part ${partIndex + 1}, ` : "";
      if (message) return { place: `${part}ring ${ringIndex + 1}`, message };
    }
  }
  return null;
}
