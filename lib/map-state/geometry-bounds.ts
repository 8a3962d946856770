import type { Bounds } from "@/lib/map-state/field-book-store";

/** West, south, east, north of any GeoJSON object (geometry, feature or collection); null when it has no position. */
export function boundsOfGeometry(geometry: unknown): Bounds | null {
  const box: Bounds = [Infinity, Infinity, -Infinity, -Infinity];
  grow(box, geometry);
  return box[0] <= box[2] ? box : null;
}

function grow(box: Bounds, value: unknown): void {
  if (Array.isArray(value)) {
    const [longitude, latitude] = value as unknown[];
    if (typeof longitude === "number" && typeof latitude === "number") {
      box[0] = Math.min(box[0], longitude);
      box[1] = Math.min(box[1], latitude);
      box[2] = Math.max(box[2], longitude);
      box[3] = Math.max(box[3], latitude);
      return;
    }
    for (const item of value as unknown[]) grow(box, item);
  } else if (value !== null && typeof value === "object") {
    const holder = value as Record<string, unknown>;
    for (const key of ["coordinates", "geometry", "geometries", "features"]) grow(box, holder[key]);
  }
}

/** Bounds opened by a share of their own size on each side, and at least by `leastDegrees`. */
export function openBounds(bounds: Bounds, share: number, leastDegrees = 0.0002): Bounds {
  const wider = Math.max(leastDegrees, (bounds[2] - bounds[0]) * share);
  const taller = Math.max(leastDegrees, (bounds[3] - bounds[1]) * share);
  return [bounds[0] - wider, bounds[1] - taller, bounds[2] + wider, bounds[3] + taller];
}
