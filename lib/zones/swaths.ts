import { kinks, unkinkPolygon } from "@turf/turf";
import type { Feature, FeatureCollection, MultiPolygon, Polygon } from "geojson";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { cutAtAntimeridian, unwrapPositions } from "@/lib/geo/cut-at-antimeridian";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { passSteps } from "@/lib/rows/pass-members";
import { ringMeets, type Bbox } from "@/lib/zones/plane-window";
import { outerStrip, outlinePass, stripRing } from "@/lib/zones/strip-polygon";

export interface SwathProperties {
  pass: number;
  /** Area of the polygon on the ellipsoid. */
  areaM2: number;
  headingDeg: number | null;
  lengthM: number;
}

export type SwathCollection = FeatureCollection<Polygon | MultiPolygon, SwathProperties>;

/** Swaths are looked at, not measured by the centimetre. */
const OUTLINE_TOLERANCE_M = 0.1;

/** One polygon a pass: the ground between its outer row edges. Where a tight turn makes it cross itself, its parts. */
export function buildSwaths(placed: PlacedLog, options: { bbox?: Bbox } = {}): SwathCollection {
  const strip = outerStrip(placed);
  const features = placed.passes.flatMap((pass) => {
    const steps = passSteps(placed, pass).filter((step) => step.before >= 0 || step.after >= 0);
    const outline = outlinePass(placed, steps, { outer: strip, toleranceM: OUTLINE_TOLERANCE_M });
    const ring = stripRing(placed, outline, { strip, first: 0, last: steps.length - 1 });
    if (ring.length < 4 || (options.bbox && !ringMeets(ring, options.bbox))) return [];
    return [swathFeature(pass, { type: "Polygon", coordinates: [unwrapPositions(ring)] })];
  });
  return { type: "FeatureCollection", features };
}

function swathFeature(pass: Pass, polygon: Polygon): Feature<Polygon | MultiPolygon, SwathProperties> {
  const geometry = cutParts(untangle(polygon));
  const headingDeg = Number.isFinite(pass.headingDeg) ? pass.headingDeg : null;
  const areaM2 = geodesicAreaM2(geometry);
  return { type: "Feature", geometry, properties: { pass: pass.pass, areaM2, headingDeg, lengthM: pass.lengthM } };
}

function cutParts(shape: Polygon | MultiPolygon): Polygon | MultiPolygon {
  const polygons = shape.type === "Polygon" ? [shape.coordinates] : shape.coordinates;
  const parts = polygons.flatMap((rings) => {
    const cut = cutAtAntimeridian(rings);
    return cut.type === "Polygon" ? [cut.coordinates] : cut.coordinates;
  });
  return parts.length === 1
    ? { type: "Polygon", coordinates: parts[0]! }
    : { type: "MultiPolygon", coordinates: parts };
}

function untangle(polygon: Polygon): Polygon | MultiPolygon {
  if (kinks(polygon).features.length === 0) return polygon;
  const parts = unkinkPolygon(polygon).features.map((part) => part.geometry.coordinates);
  return parts.length === 1
    ? { type: "Polygon", coordinates: parts[0]! }
    : { type: "MultiPolygon", coordinates: parts };
}
