import type { MultiPolygon, Polygon } from "geojson";
import { countBits, createBitGrid, emptyCopy, type BitGrid } from "@/lib/coverage/bit-grid";
import { countEnclosedGaps } from "@/lib/coverage/enclosed-gaps";
import { fillPolygon } from "@/lib/coverage/fill-polygon";
import { fillQuad } from "@/lib/coverage/fill-quad";
import { cellBounds, visitCells } from "@/lib/coverage/pass-cells";
import { groupRows } from "@/lib/coverage/row-groups";
import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { mainAxisDeg } from "@/lib/passes/main-axis";
import { rowDistances } from "@/lib/rows/row-distances";
import { implementWidthM } from "@/lib/rows/row-geometry";

export interface Coverage {
  /** Sum over working readings of row spacing times distance. */
  sweptM2: number;
  /** Ground touched at least once. */
  coveredM2: number;
  /** Swept less covered. */
  overlapM2: number;
  /**
   * Ground not touched that lies between worked ground: gaps up to two implement widths along both directions of the grid,
   * inside the boundary where one is given. Ground open towards the rim of the field is no skip.
   */
  skippedM2: number;
  /** Side of the grid's cells. */
  resolutionM: number;
}

export interface CoverageOptions {
  distances?: Float32Array;
  boundary?: Polygon | MultiPolygon | null;
  /** Cells of the grid at most; they grow beyond that. The default takes 64 MB. */
  maxCells?: number;
}

/**
 * The grid stands at this angle to the passes: along them, a whole edge would fall to one side of a line of cell centres
 * and the errors would add up; aslant they cancel.
 */
const GRID_TURN_DEG = 31;
const CELLS_PER_SPACING = 2.5;
const MAX_CELLS = 2 ** 29;

/** Area swept, covered, overlapped and skipped, by a grid finer than half a row spacing. */
export function measureCoverage(placed: PlacedLog, options: CoverageOptions = {}): Coverage {
  const sweptM2 = sweptAreaM2(placed, options.distances ?? rowDistances(placed));
  const xAxisDeg = (mainAxisDeg(placed.passes) ?? 0) + GRID_TURN_DEG;
  const frame = { groups: groupRows(placed.geometry), xAxisDeg };
  const bounds = cellBounds(placed, frame);
  if (!bounds) return { sweptM2, coveredM2: 0, overlapM2: sweptM2, skippedM2: 0, resolutionM: 0 };
  const spacingM = Math.min(...placed.geometry.widthM);
  const grid = createBitGrid(bounds, spacingM / CELLS_PER_SPACING, options.maxCells ?? MAX_CELLS);
  visitCells(placed, frame, (quad) => fillQuad(grid, quad));
  const cellM2 = grid.cellM * grid.cellM;
  const coveredM2 = Math.min(countBits(grid) * cellM2, sweptM2);
  const maxGap = Math.ceil((2 * implementWidthM(placed.geometry)) / grid.cellM);
  const inside = options.boundary ? boundaryGrid(placed, grid, { boundary: options.boundary, xAxisDeg }) : null;
  const skippedM2 = countEnclosedGaps(grid, maxGap, inside) * cellM2;
  return { sweptM2, coveredM2, overlapM2: sweptM2 - coveredM2, skippedM2, resolutionM: grid.cellM };
}

function sweptAreaM2(placed: PlacedLog, distances: Float32Array): number {
  const { rows, widthM } = placed.geometry;
  let area = 0;
  for (let at = 0; at < distances.length; at += rows) {
    for (let row = 0; row < rows; row++) area += distances[at + row]! * widthM[row]!;
  }
  return area;
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
