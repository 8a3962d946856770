import type { Polygon, Position } from "geojson";
import type { Boundary } from "@/lib/schemas/geometry";

/** Decimals of a degree that drawing keeps: a tenth of a millimetre. */
const DECIMALS = 9;

function roundPosition(position: Position): Position {
  return position.slice(0, 2).map((part) => Number(part.toFixed(DECIMALS)));
}

/** The outlines of a boundary, one polygon a part; null where a part has a hole, which outlines cannot show. */
export function outlinesOf(boundary: Boundary): Polygon[] | null {
  const parts = boundary.type === "Polygon" ? [boundary.coordinates] : boundary.coordinates;
  if (parts.some((rings) => rings.length > 1)) return null;
  return parts.map((rings) => ({ type: "Polygon", coordinates: rings.map((ring) => ring.map(roundPosition)) }));
}

/** Outlines as one boundary; null where there are none. */
export function boundaryOf(outlines: readonly Polygon[]): Boundary | null {
  const [first] = outlines;
  if (!first) return null;
  if (outlines.length === 1) return { type: "Polygon", coordinates: first.coordinates };
  return { type: "MultiPolygon", coordinates: outlines.map((outline) => outline.coordinates) };
}
