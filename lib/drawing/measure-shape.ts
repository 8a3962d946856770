import type { LineString, Point, Polygon, Position } from "geojson";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { geodesicDistanceM } from "@/lib/geo/geodesic-distance";

export interface ShapeMeasures {
  /** Along the line or round the outline. */
  lengthM: number;
  /** From the corner before to the latest; null before there are two. */
  lastSideM: number | null;
  /** Of an outline; null for a line or a point. */
  areaM2: number | null;
}

function lonLat(position: Position): [number, number] {
  return [position[0] ?? NaN, position[1] ?? NaN];
}

function sidesM(positions: readonly Position[]): number[] {
  return positions.slice(1).map((end, index) => geodesicDistanceM(lonLat(positions[index] ?? []), lonLat(end)));
}

/** Length and area on the WGS 84 ellipsoid of what is being drawn, whatever state it is in: an outline may still be open. */
export function measureShape(geometry: Point | LineString | Polygon): ShapeMeasures {
  if (geometry.type === "Point") return { lengthM: 0, lastSideM: null, areaM2: null };
  const line = geometry.type === "Polygon" ? (geometry.coordinates[0] ?? []) : geometry.coordinates;
  const sides = sidesM(line);
  const lengthM = sides.reduce((sum, side) => sum + side, 0);
  if (geometry.type === "LineString") return { lengthM, lastSideM: sides.at(-1) ?? null, areaM2: null };
  // The last side of a ring leads home; the one before it was drawn last.
  return { lengthM, lastSideM: sides.at(-2) ?? null, areaM2: geodesicAreaM2(geometry) };
}
