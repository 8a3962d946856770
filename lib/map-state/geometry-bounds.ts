import type { Bounds } from "@/lib/map-state/field-book-store";

/**
 * West, south, east, north of any GeoJSON object (geometry, feature or collection); null when it has no position. Across the
 * antimeridian east runs on past 180: of the two boxes that hold everything the narrower is taken.
 */
export function boundsOfGeometry(geometry: unknown): Bounds | null {
  const plain: Bounds = [Infinity, Infinity, -Infinity, -Infinity];
  grow(plain, geometry, false);
  if (!(plain[0] <= plain[2])) return null;
  if (plain[2] - plain[0] <= 180) return plain;
  const across: Bounds = [Infinity, Infinity, -Infinity, -Infinity];
  grow(across, geometry, true);
  return across[2] - across[0] < plain[2] - plain[0] ? across : plain;
}

/** A box of the API, whose west > east across the antimeridian, as a map wants it. */
export function unwrapBounds([west, south, east, north]: Bounds): Bounds {
  return [west, south, east < west ? east + 360 : east, north];
}

function grow(box: Bounds, value: unknown, across: boolean): void {
  if (Array.isArray(value)) {
    const [written, latitude] = value as unknown[];
    if (typeof written === "number" && typeof latitude === "number") {
      const longitude = across && written < 0 ? written + 360 : written;
      box[0] = Math.min(box[0], longitude);
      box[1] = Math.min(box[1], latitude);
      box[2] = Math.max(box[2], longitude);
      box[3] = Math.max(box[3], latitude);
      return;
    }
    for (const item of value as unknown[]) grow(box, item, across);
  } else if (value !== null && typeof value === "object") {
    const holder = value as Record<string, unknown>;
    for (const key of ["coordinates", "geometry", "geometries", "features"]) grow(box, holder[key], across);
  }
}

/** Bounds opened by a share of their own size on each side, and at least by `leastDegrees`. */
export function openBounds(bounds: Bounds, share: number, leastDegrees = 0.0002): Bounds {
  const wider = Math.max(leastDegrees, (bounds[2] - bounds[0]) * share);
  const taller = Math.max(leastDegrees, (bounds[3] - bounds[1]) * share);
  return [bounds[0] - wider, bounds[1] - taller, bounds[2] + wider, bounds[3] + taller];
}
