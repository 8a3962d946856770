import type { MultiPolygon, Polygon } from "geojson";
import { polygonsOf, windRightHanded } from "@/lib/export/geometry/wind-rings";

/** A polygon in well-known text (OGC 06-103r4), longitude before latitude. */
export function polygonWkt(shape: Polygon | MultiPolygon): string {
  const polygons = polygonsOf(windRightHanded(shape)).map(
    (rings) => `(${rings.map((ring) => `(${ring.map(([lon, lat]) => `${lon} ${lat}`).join(", ")})`).join(", ")})`,
  );
  return shape.type === "Polygon" ? `POLYGON ${polygons[0] ?? "EMPTY"}` : `MULTIPOLYGON (${polygons.join(", ")})`;
}
