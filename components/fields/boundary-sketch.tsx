import type { MultiPolygon, Polygon, Position } from "geojson";
import { longitudeNear } from "@/lib/geo/cut-at-antimeridian";
import { boundsOfGeometry } from "@/lib/map-state/geometry-bounds";

const SIZE = 100;
const MARGIN = 4;

function ringsOf(boundary: Polygon | MultiPolygon): Position[][] {
  return boundary.type === "Polygon" ? boundary.coordinates : boundary.coordinates.flat();
}

/** Puts positions into a 100 by 100 box, north up, true to shape (longitude shrunk by the cosine of latitude). */
function createPlacer(points: Position[]): (point: Position) => string {
  const [west, south, east, north] = boundsOfGeometry({ coordinates: points }) ?? [0, 0, 0, 0];
  const shrink = Math.cos((((south + north) / 2) * Math.PI) / 180);
  const [width, height] = [(east - west) * shrink, north - south];
  const scale = (SIZE - 2 * MARGIN) / Math.max(width, height, 1e-9);
  const [left, top] = [(SIZE - width * scale) / 2, (SIZE - height * scale) / 2];
  return (point) => {
    const x = left + (longitudeNear(point[0] ?? NaN, (west + east) / 2) - west) * shrink * scale;
    const y = top + (north - (point[1] ?? NaN)) * scale;
    return `${x.toFixed(2)} ${y.toFixed(2)}`;
  };
}

/** The boundary as one SVG path. */
export function boundaryPath(boundary: Polygon | MultiPolygon): string {
  const rings = ringsOf(boundary);
  const place = createPlacer(rings.flat());
  return rings.map((ring) => `M${ring.map(place).join("L")}Z`).join("");
}

/** Lines on the ground, in the box that the boundary fills. */
export function linesPath(boundary: Polygon | MultiPolygon, lines: Position[][]): string {
  const place = createPlacer(ringsOf(boundary).flat());
  return lines.map((line) => `M${line.map(place).join("L")}`).join("");
}

export interface BoundarySketchProps {
  boundary: Polygon | MultiPolygon | null;
  /** Places to point out, such as the stretch a sentence speaks of. */
  lines?: Position[][];
  /** Said by screen readers; leave out where the text beside it says enough. */
  label?: string;
  className?: string;
}

/** The outline of a field as one would draw it in a notebook; a dashed square where there is none. */
export function BoundarySketch({ boundary, lines = [], label, className }: BoundarySketchProps) {
  return (
    <svg
      viewBox={`0 0 ${SIZE} ${SIZE}`}
      className={className}
      role={label ? "img" : undefined}
      aria-label={label}
      aria-hidden={label ? undefined : true}
    >
      {boundary ? (
        <path
          d={boundaryPath(boundary)}
          fill="#C29A4526"
          fillRule="evenodd"
          stroke="#1E2430"
          strokeWidth="1.25"
          vectorEffect="non-scaling-stroke"
          strokeLinejoin="round"
        />
      ) : (
        <rect x="14" y="14" width="72" height="72" fill="none" stroke="#6B7280" strokeDasharray="4 4" />
      )}
      {boundary && lines.length > 0 ? (
        <path
          d={linesPath(boundary, lines)}
          fill="none"
          stroke="#9A4A2C"
          strokeWidth="4"
          strokeLinecap="round"
          vectorEffect="non-scaling-stroke"
        />
      ) : null}
    </svg>
  );
}
