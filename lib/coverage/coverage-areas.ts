import type { MultiPolygon, Polygon } from "geojson";
import { connectRuns, countCells, joinRuns, wordRuns, type CellRun } from "@/lib/coverage/cell-runs";
import { drawPasses, type DrawnPasses } from "@/lib/coverage/draw-passes";
import { findSkips, LEAST_AREA_M2 } from "@/lib/coverage/find-skips";
import { overlapCause } from "@/lib/coverage/overlap-cause";
import { shapeCells } from "@/lib/coverage/shape-cells";
import { ownersAt } from "@/lib/coverage/worked-grid";
import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { mainAxisDeg } from "@/lib/passes/main-axis";
import { implementWidthM } from "@/lib/rows/row-geometry";
import type { CoverageArea, CoverageAreas, OverlapCause } from "@/lib/schemas/coverage";

/** More would be no map: the largest are told. */
const MOST_AREAS = 2000;

interface Piece {
  runs: CellRun[];
  properties: Pick<CoverageArea["properties"], "kind" | "cause" | "passes">;
}

/**
 * Every piece of ground of at least 1 m2 that was worked twice, with its cause and passes, or left out, the largest first
 * (at most 2000). The areas are those of the grid that `measureCoverage` counts; the polygons follow it within one cell.
 */
export function coverageAreas(placed: PlacedLog, boundary: Polygon | MultiPolygon | null): CoverageAreas {
  const again: { row: number; word: number; bits: number; later: number; earlier: number }[] = [];
  const drawn = drawPasses(placed, { visit: (found) => again.push({ ...found }) });
  if (!drawn) return { type: "FeatureCollection", features: [] };
  const cellM2 = drawn.worked.cells.cellM ** 2;
  const pieces = [...overlapPieces(placed, drawn, again), ...skipPieces(placed, drawn, boundary)]
    .map((piece) => ({ ...piece, areaM2: countCells(piece.runs) * cellM2 }))
    .filter((piece) => piece.areaM2 >= LEAST_AREA_M2)
    .sort((a, b) => b.areaM2 - a.areaM2)
    .slice(0, MOST_AREAS);
  const frame = { grid: drawn.worked.cells, xAxisDeg: drawn.frame.xAxisDeg, plane: placed.plane };
  const axisDeg = mainAxisDeg(placed.passes) ?? 0;
  const features = pieces.map(({ runs, properties, areaM2 }): CoverageArea => {
    const headingDeg = placed.passes.find((pass) => pass.pass === properties.passes[0])?.headingDeg ?? axisDeg;
    const lengthM = extentM(runs, { cellM: frame.grid.cellM, turnDeg: headingDeg - frame.xAxisDeg });
    const geometry = shapeCells(runs, frame) as CoverageArea["geometry"];
    return { type: "Feature", geometry, properties: { ...properties, areaM2, lengthM } };
  });
  return { type: "FeatureCollection", features };
}

function overlapPieces(
  placed: PlacedLog,
  { stretches }: DrawnPasses,
  again: readonly { row: number; word: number; bits: number; later: number; earlier: number }[],
): Piece[] {
  const widthM = implementWidthM(placed.geometry);
  const groups = new Map<string, Piece>();
  for (const { row, word, bits, later, earlier } of again) {
    const [a, b] = [stretches[later]!, stretches[earlier]!];
    const cause: OverlapCause = overlapCause(a, b, widthM);
    const key = `${a.pass.pass} ${b.pass.pass} ${cause}`;
    let group = groups.get(key);
    if (!group) {
      const passes = [...new Set([b.pass.pass, a.pass.pass])];
      groups.set(key, (group = { runs: [], properties: { kind: "overlap", cause, passes } }));
    }
    group.runs.push(...wordRuns(row, word, bits));
  }
  return [...groups.values()].flatMap(({ runs, properties }) =>
    connectRuns(joinRuns(runs)).map((piece) => ({ runs: piece, properties })),
  );
}

function skipPieces(placed: PlacedLog, drawn: DrawnPasses, boundary: Polygon | MultiPolygon | null): Piece[] {
  const { worked, frame, stretches } = drawn;
  return findSkips(placed, worked.cells, { boundary, xAxisDeg: frame.xAxisDeg }).pieces.map(({ runs }) => {
    const beside = new Set<number>();
    for (const { row, from, end } of runs) {
      for (const column of [from - 1, end]) {
        for (const owner of ownersAt(worked, row, column)) beside.add(stretches[owner]!.pass.pass);
      }
    }
    const passes = [...beside].sort((a, b) => a - b);
    return { runs, properties: { kind: "skip", cause: null, passes } };
  });
}

/** Longest extent of cells along a direction, metres: from the first cell's middle to the last one's, and one cell. */
function extentM(runs: readonly CellRun[], { cellM, turnDeg }: { cellM: number; turnDeg: number }): number {
  const cos = Math.cos(turnDeg * RADIANS_PER_DEGREE);
  const sin = Math.sin(turnDeg * RADIANS_PER_DEGREE);
  let least = Infinity;
  let most = -Infinity;
  for (const { row, from, end } of runs) {
    for (const column of [from, end - 1]) {
      const along = column * cos - row * sin;
      least = Math.min(least, along);
      most = Math.max(most, along);
    }
  }
  return (most - least + 1) * cellM;
}
