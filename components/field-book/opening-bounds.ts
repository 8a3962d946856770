import type { Bounds } from "@/lib/map-state/field-book-store";
import { boundsOfGeometry } from "@/lib/map-state/geometry-bounds";
import type { Field } from "@/lib/schemas/fields";
import type { Log } from "@/lib/schemas/logs";

/** Where a map of a log opens: the field's boundary, or what the log covers. */
export function openingBounds(field: Field, log: Log): Bounds {
  const [west, south, east, north] = log.bbox ?? [-180, -60, 180, 75];
  // Across the antimeridian east runs on past 180.
  return boundsOfGeometry(field.boundary) ?? [west, south, east < west ? east + 360 : east, north];
}
