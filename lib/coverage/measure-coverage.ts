import type { MultiPolygon, Polygon } from "geojson";
import { countBits, countWordBits } from "@/lib/coverage/bit-grid";
import { drawPasses } from "@/lib/coverage/draw-passes";
import { findSkips } from "@/lib/coverage/find-skips";
import { overlapCause } from "@/lib/coverage/overlap-cause";
import { findSwitchedOff } from "@/lib/coverage/switched-off";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { implementWidthM } from "@/lib/rows/row-geometry";
import { OVERLAP_CAUSES, type OverlapByCause, type OverlapCause } from "@/lib/schemas/coverage";

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
  /** In the order of `OVERLAP_CAUSES`; the areas add up to `overlapM2`. */
  overlapByCause: OverlapByCause[];
  /** Pieces of skipped ground of at least 1 m2. */
  skips: { count: number; areaM2: number; largestM2: number };
}

export interface CoverageOptions {
  distances?: Float32Array;
  boundary?: Polygon | MultiPolygon | null;
  /** Cells of the grid at most; they grow beyond that. The default takes 128 MB. */
  maxCells?: number;
}

/** Area swept, covered, overlapped by cause, and skipped, by a grid finer than half a row spacing. */
export function measureCoverage(placed: PlacedLog, options: CoverageOptions = {}): Coverage {
  const switchedOff = findSwitchedOff(placed);
  const sweptM2 = sweptAreaM2(placed, options.distances ?? rowDistances(placed), switchedOff);
  const cells = new Map<number, number>();
  const drawn = drawPasses(placed, {
    maxCells: options.maxCells,
    switchedOff,
    visit: ({ bits, later, earlier }) => {
      const pair = later * STRETCHES + earlier;
      cells.set(pair, (cells.get(pair) ?? 0) + countWordBits(bits));
    },
  });
  if (!drawn) return nothingDrawn(sweptM2);
  const { worked, frame, stretches } = drawn;
  const { cellM } = worked.cells;
  const coveredM2 = Math.min(countBits(worked.cells) * cellM * cellM, sweptM2);
  const widthM = implementWidthM(placed.geometry);
  const causes = new Map<OverlapCause, number>();
  for (const [pair, count] of cells) {
    const later = stretches[Math.floor(pair / STRETCHES)]!;
    const cause = overlapCause(later, stretches[pair % STRETCHES]!, widthM);
    causes.set(cause, (causes.get(cause) ?? 0) + count * cellM * cellM);
  }
  const overlapM2 = sweptM2 - coveredM2;
  const { boundary = null } = options;
  const skips = findSkips(placed, worked.cells, { boundary, xAxisDeg: frame.xAxisDeg });
  return {
    sweptM2,
    coveredM2,
    overlapM2,
    skippedM2: skips.cells * cellM * cellM,
    resolutionM: cellM,
    overlapByCause: shareOut(causes, overlapM2),
    skips: {
      count: skips.pieces.length,
      areaM2: skips.pieces.reduce((sum, piece) => sum + piece.areaM2, 0),
      largestM2: skips.pieces[0]?.areaM2 ?? 0,
    },
  };
}

/** More stretches than a log has: pairs of them make one number. */
const STRETCHES = 2 ** 26;

function nothingDrawn(sweptM2: number): Coverage {
  const overlapByCause = shareOut(new Map(), sweptM2);
  const skips = { count: 0, areaM2: 0, largestM2: 0 };
  return { sweptM2, coveredM2: 0, overlapM2: sweptM2, skippedM2: 0, resolutionM: 0, overlapByCause, skips };
}

/**
 * Causes that add up to the overlap, which is swept less covered: what the grid did not see twice (a pass that crosses itself)
 * is other; where the grid saw a little more than that, all are scaled down.
 */
function shareOut(causes: ReadonlyMap<OverlapCause, number>, overlapM2: number): OverlapByCause[] {
  const seenM2 = [...causes.values()].reduce((sum, areaM2) => sum + areaM2, 0);
  const factor = seenM2 > overlapM2 ? overlapM2 / seenM2 : 1;
  const restM2 = Math.max(0, overlapM2 - seenM2);
  return OVERLAP_CAUSES.map((cause) => ({
    cause,
    areaM2: factor * (causes.get(cause) ?? 0) + (cause === "other" ? restM2 : 0),
  }));
}

function sweptAreaM2(placed: PlacedLog, distances: Float32Array, switchedOff: Uint8Array | null): number {
  const { rows, widthM } = placed.geometry;
  let area = 0;
  for (let at = 0; at < distances.length; at += rows) {
    for (let row = 0; row < rows; row++) {
      if (switchedOff?.[at + row] !== 1) area += distances[at + row]! * widthM[row]!;
    }
  }
  return area;
}
