import { featureCollection, kinks, polygon as turfPolygon, union } from "@turf/turf";
import type { Feature, FeatureCollection, MultiPolygon, Polygon, Position } from "geojson";
import { doubledArea } from "@/lib/coverage/outline-cells";
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

/** One polygon a pass: the ground between its outer row edges. Where a tight turn makes it cross itself, the ground it sweeps, once. */
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

/** A ring that crosses itself as the ground it sweeps: the union (turf) of its pieces from edge to edge. */
function untangle(polygon: Polygon): Polygon | MultiPolygon {
  if (kinks(polygon).features.length === 0) return polygon;
  const pieces = edgePieces(polygon.coordinates[0] ?? []).map((ring) => turfPolygon([ring]));
  return union(featureCollection(pieces))?.geometry ?? polygon;
}

/** Quads between the edges of a strip's ring, whose second half runs back along the other side; one that crosses itself, as two triangles. */
function edgePieces(ring: readonly Position[]): Position[][] {
  const edges = (ring.length - 1) / 2;
  const pieces: Position[][] = [];
  for (let k = 0; k + 1 < edges; k++) {
    const [a, b] = [ring[k]!, ring[k + 1]!];
    const [c, d] = [ring[2 * edges - 2 - k]!, ring[2 * edges - 1 - k]!];
    const quad = [a, b, c, d, a];
    const [crossing] = kinks({ type: "Polygon", coordinates: [quad] }).features;
    const middle = crossing?.geometry.coordinates;
    if (!middle) pieces.push(quad);
    // Either the sides cross (a turn on the spot) or the ends do.
    else if (crosses(a, b, middle)) pieces.push([a, middle, d, a], [b, c, middle, b]);
    else pieces.push([a, b, middle, a], [c, d, middle, c]);
  }
  return pieces.filter((piece) => Math.abs(doubledArea(piece)) > 0);
}

/** True where a point known to lie on one of two lines lies on this one. */
function crosses(
  [ax = NaN, ay = NaN]: Position,
  [bx = NaN, by = NaN]: Position,
  [x = NaN, y = NaN]: Position,
): boolean {
  const length = Math.hypot(bx - ax, by - ay);
  return Math.abs((bx - ax) * (y - ay) - (by - ay) * (x - ax)) <= 1e-6 * length * length;
}
