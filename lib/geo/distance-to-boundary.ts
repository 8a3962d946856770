import { geodesicDistanceM } from "@/lib/geo/geodesic-distance";
import { createLocalPlane } from "@/lib/geo/local-plane";
import type { Boundary } from "@/lib/schemas/geometry";

type Segment = readonly [eastM: number, northM: number, eastM: number, northM: number];

/** Beyond this from the boundary's first corner the plane is left for the ellipsoid: the corner's own distance will do. */
const PLANE_REACH_DEG = 1;

/**
 * How far a place lies outside a boundary, in metres; 0 inside it and on its edge. Holes are outside. NaN for a place
 * without a position.
 */
export function distanceToBoundary(boundary: Boundary): (longitude: number, latitude: number) => number {
  const rings = boundary.type === "Polygon" ? boundary.coordinates : boundary.coordinates.flat();
  const [cornerLongitude = 0, cornerLatitude = 0] = rings[0]?.[0] ?? [];
  const plane = createLocalPlane(cornerLongitude, cornerLatitude);
  const segments: Segment[] = rings.flatMap((ring) => {
    const places = ring.map((position) => plane.toPlane(position[0] ?? NaN, position[1] ?? NaN));
    return places.slice(1).map((to, i): Segment => [...(places[i] ?? to), ...to]);
  });
  return (longitude, latitude) => {
    if (!Number.isFinite(longitude) || !Number.isFinite(latitude)) return NaN;
    const across = Math.abs(longitude - cornerLongitude) % 360;
    const apartDeg = Math.max(Math.min(across, 360 - across), Math.abs(latitude - cornerLatitude));
    if (apartDeg > PLANE_REACH_DEG) {
      return geodesicDistanceM([cornerLongitude, cornerLatitude], [longitude, latitude]);
    }
    return distanceToSegments(segments, plane.toPlane(longitude, latitude));
  };
}

function distanceToSegments(segments: readonly Segment[], [east, north]: [number, number]): number {
  let isInside = false;
  let least = Infinity;
  for (const [x1, y1, x2, y2] of segments) {
    if (y1 > north !== y2 > north && east < x1 + ((north - y1) / (y2 - y1)) * (x2 - x1)) isInside = !isInside;
    const length = (x2 - x1) ** 2 + (y2 - y1) ** 2;
    const along = length === 0 ? 0 : ((east - x1) * (x2 - x1) + (north - y1) * (y2 - y1)) / length;
    const share = Math.min(1, Math.max(0, along));
    least = Math.min(least, Math.hypot(east - x1 - share * (x2 - x1), north - y1 - share * (y2 - y1)));
  }
  return isInside ? 0 : least;
}
