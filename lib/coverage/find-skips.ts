import type { MultiPolygon, Polygon } from "geojson";
import { emptyCopy, type BitGrid } from "@/lib/coverage/bit-grid";
import { connectRuns, countCells, gridRuns, type CellRun } from "@/lib/coverage/cell-runs";
import { markEnclosedGaps } from "@/lib/coverage/enclosed-gaps";
import { fillPolygon } from "@/lib/coverage/fill-polygon";
import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { implementWidthM } from "@/lib/rows/row-geometry";

/** Smaller pieces are the rounding of the grid along seams rather than ground left out. */
export const LEAST_AREA_M2 = 1;

export interface Skips {
  /** All cells left out, the small ones too. */
  cells: number;
  /** Those of at least 1 m2, the largest first. */
  pieces: { runs: CellRun[]; areaM2: number }[];
}

/** Ground left out: gaps of up to two implement widths between worked ground, inside the boundary where one is given. */
export function findSkips(
  placed: PlacedLog,
  worked: BitGrid,
  { boundary, xAxisDeg }: { boundary: Polygon | MultiPolygon | null; xAxisDeg: number },
): Skips {
  const maxGap = Math.ceil((2 * implementWidthM(placed.geometry)) / worked.cellM);
  const inside = boundary ? boundaryGrid(placed, worked, { boundary, xAxisDeg }) : null;
  const runs = gridRuns(markEnclosedGaps(worked, maxGap, inside));
  const cellM2 = worked.cellM * worked.cellM;
  const pieces = connectRuns(runs)
    .map((piece) => ({ runs: piece, areaM2: countCells(piece) * cellM2 }))
    .filter((piece) => piece.areaM2 >= LEAST_AREA_M2)
    .sort((a, b) => b.areaM2 - a.areaM2);
  return { cells: countCells(runs), pieces };
}

interface TurnedBoundary {
  boundary: Polygon | MultiPolygon;
  xAxisDeg: number;
}

function boundaryGrid(placed: PlacedLog, grid: BitGrid, { boundary, xAxisDeg }: TurnedBoundary): BitGrid {
  const inside = emptyCopy(grid);
  const sin = Math.sin(xAxisDeg * RADIANS_PER_DEGREE);
  const cos = Math.cos(xAxisDeg * RADIANS_PER_DEGREE);
  const polygons = boundary.type === "Polygon" ? [boundary.coordinates] : boundary.coordinates;
  for (const rings of polygons) {
    const turned = rings.map((ring) =>
      Float64Array.from(
        ring.flatMap((corner) => {
          const [east, north] = placed.plane.toPlane(corner[0] ?? NaN, corner[1] ?? NaN);
          return [east * sin + north * cos, north * sin - east * cos];
        }),
      ),
    );
    fillPolygon(inside, turned);
  }
  return inside;
}
