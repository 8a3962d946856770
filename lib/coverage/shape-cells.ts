import { kinks, simplify } from "@turf/turf";
import type { MultiPolygon, Polygon, Position } from "geojson";
import type { BitGrid } from "@/lib/coverage/bit-grid";
import { connectRuns, type CellRun } from "@/lib/coverage/cell-runs";
import { doubledArea, outlineCells } from "@/lib/coverage/outline-cells";
import { cutAtAntimeridian } from "@/lib/geo/cut-at-antimeridian";
import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { LocalPlane } from "@/lib/geo/local-plane";

interface ShapeFrame {
  grid: Pick<BitGrid, "originX" | "originY" | "cellM">;
  xAxisDeg: number;
  plane: LocalPlane;
}

/** Straightening is tried within so many cells, then less, then not at all. */
const TOLERANCES_CELLS = [1.5, 0.75];

/**
 * A piece of ground as a polygon in degrees, or several where its parts touch in corners only: its outline, straightened
 * within a cell and a half (turf's Douglas and Peucker); less where that would make it cross itself or vanish.
 */
export function shapeCells(runs: readonly CellRun[], frame: ShapeFrame): Polygon | MultiPolygon {
  const polygons = connectRuns(runs, { sidesOnly: true }).flatMap((part) => {
    const rings = outlineCells(part).sort((a, b) => doubledArea(b) - doubledArea(a));
    const shape = cutAtAntimeridian(straighten(rings).map((ring) => ring.map((corner) => toDegrees(corner, frame))));
    return shape.type === "Polygon" ? [shape.coordinates] : shape.coordinates;
  });
  return polygons.length === 1
    ? { type: "Polygon", coordinates: polygons[0]! }
    : { type: "MultiPolygon", coordinates: polygons };
}

function straighten(rings: Position[][]): Position[][] {
  for (const tolerance of TOLERANCES_CELLS) {
    const straight = simplify({ type: "Polygon", coordinates: rings }, { tolerance, highQuality: true });
    const isLost = straight.coordinates.some((ring, k) => doubledArea(ring) * doubledArea(rings[k]!) <= 0);
    if (!isLost && kinks(straight).features.length === 0) return straight.coordinates;
  }
  return rings;
}

/** Degrees to 8 decimals, about a millimetre. */
function toDegrees([column = NaN, row = NaN]: Position, { grid, xAxisDeg, plane }: ShapeFrame): Position {
  const x = grid.originX + column * grid.cellM;
  const y = grid.originY + row * grid.cellM;
  const sin = Math.sin(xAxisDeg * RADIANS_PER_DEGREE);
  const cos = Math.cos(xAxisDeg * RADIANS_PER_DEGREE);
  return plane.toDegrees(x * sin - y * cos, x * cos + y * sin).map((value) => Math.round(value * 1e8) / 1e8);
}
