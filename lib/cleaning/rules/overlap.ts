import type { CleaningRule } from "@/lib/cleaning/rule-catalogue";
import type { RuleInput, RuleMask } from "@/lib/cleaning/rule-mask";
import { createBitGrid, isSet, type BitGrid } from "@/lib/coverage/bit-grid";
import { fillQuad } from "@/lib/coverage/fill-quad";
import { cellBounds, visitCells, type CellFrame } from "@/lib/coverage/pass-cells";
import { groupRows } from "@/lib/coverage/row-groups";
import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { passSteps, type PassStep } from "@/lib/rows/pass-members";

/** Cells of the grid across a row, and most of them in all (32 MB). */
const CELLS_PER_SPACING = 3;
const MAX_CELLS = 2 ** 28;
/** The ground of a reading is looked at in nine places: these shares of its length and of its width. */
const LOOKS = [1 / 6, 3 / 6, 5 / 6] as const;

/** x east and y north: `fillQuad` and the looks below must mean the same. */
const NORTH_UP = 90;

/**
 * Readings on ground of which more than `minShareFraction` had been worked by passes that ended more than `minApartS` before
 * this one began (any earlier pass where the log has no times). The ground of a reading is its row's width and the way from
 * the record before; it is looked at in nine places on a grid of a third of a row. A value logged for the whole machine goes
 * where that holds for its whole width.
 */
export function findOverlaps({ placed }: RuleInput, rule: CleaningRule<"overlap">): RuleMask {
  const { rows } = placed.geometry;
  const cells = new Uint8Array(placed.log.records * rows);
  const whole = new Uint8Array(placed.log.records);
  const frame: CellFrame = { groups: groupRows(placed.geometry), xAxisDeg: NORTH_UP };
  const bounds = cellBounds(placed, frame);
  if (!bounds) return {};
  const grid = createBitGrid(bounds, Math.min(...placed.geometry.widthM) / CELLS_PER_SPACING, MAX_CELLS);
  const waiting: Pass[] = [];
  const inOrder = [...placed.passes].sort((a, b) => a.pass - b.pass);
  let isWorked = false;
  for (const pass of inOrder) {
    while (waiting.length > 0 && endedBefore(waiting[0]!, pass, rule.minApartS)) {
      const earlier = waiting.shift()!;
      visitCells({ ...placed, passes: [earlier] }, frame, (quad) => fillQuad(grid, quad));
      isWorked = true;
    }
    if (isWorked) markPass(placed, pass, { grid, minShare: rule.minShareFraction, cells, whole });
    waiting.push(pass);
  }
  const has = (perRow: boolean) => placed.log.channels.some((channel) => channel.perRow === perRow);
  return { ...(has(true) ? { cells } : {}), ...(has(false) ? { whole } : {}) };
}

function endedBefore(earlier: Pass, later: Pass, minApartS: number): boolean {
  const apartS = (later.startedAtMs - earlier.endedAtMs) / 1000;
  return Number.isNaN(apartS) || apartS > minApartS;
}

interface Marking {
  grid: BitGrid;
  minShare: number;
  cells: Uint8Array;
  whole: Uint8Array;
}

const LOOKED_AT = LOOKS.length * LOOKS.length;

/** Marks the readings of one pass by what earlier ones have worked. */
// kernel: hot loop over every reading
function markPass(placed: PlacedLog, pass: Pass, { grid, minShare, cells, whole }: Marking): void {
  const { rows, widthM } = placed.geometry;
  const edge = { from: new Float64Array(2 * rows), to: new Float64Array(2 * rows) };
  for (const step of passSteps(placed, pass)) {
    const sideways = placeStep(placed, step, edge);
    if (!sideways) continue;
    let workedInAll = 0;
    for (let row = 0; row < rows; row++) {
      const x = edge.from[2 * row]!;
      const y = edge.from[2 * row + 1]!;
      const dx = edge.to[2 * row]! - x;
      const dy = edge.to[2 * row + 1]! - y;
      let worked = 0;
      for (let across = 0; across < 3; across++) {
        const side = (LOOKS[across]! - 0.5) * widthM[row]!;
        for (let along = 0; along < 3; along++) {
          const share = LOOKS[along]!;
          const east = x + share * dx + side * sideways.east;
          worked += isWorkedAt(grid, east, y + share * dy + side * sideways.north);
        }
      }
      workedInAll += worked;
      if (worked > minShare * LOOKED_AT) cells[step.record * rows + row] = 1;
    }
    if (workedInAll > minShare * LOOKED_AT * rows) whole[step.record] = 1;
  }
}

// kernel: hot, so positional
function isWorkedAt(grid: BitGrid, east: number, north: number): number {
  const column = Math.floor((east - grid.originX) / grid.cellM);
  const row = Math.floor((north - grid.originY) / grid.cellM);
  if (column < 0 || row < 0 || column >= grid.columns || row >= grid.rows) return 0;
  return isSet(grid, row, column) ? 1 : 0;
}

/** Writes where every row stood at the record before and stands at the record; answers the direction to the right. */
function placeStep(
  placed: PlacedLog,
  { record, before, after }: PassStep,
  edge: { from: Float64Array; to: Float64Array },
): { east: number; north: number } | null {
  if (before < 0 && after < 0) return null;
  placeRowsAt(placed, record, edge.to);
  placeRowsAt(placed, before >= 0 ? before : after, edge.from);
  // The first record of a pass reaches back as far as the next one goes on.
  if (before < 0) for (let k = 0; k < edge.from.length; k++) edge.from[k] = 2 * edge.to[k]! - edge.from[k]!;
  const heading = placed.headingDeg[record]! * RADIANS_PER_DEGREE;
  return { east: Math.cos(heading), north: -Math.sin(heading) };
}

function placeRowsAt(placed: PlacedLog, record: number, into: Float64Array): void {
  const { offsetM, forwardM, rows } = placed.geometry;
  const heading = placed.headingDeg[record]! * RADIANS_PER_DEGREE;
  const sin = Math.sin(heading);
  const cos = Math.cos(heading);
  for (let row = 0; row < rows; row++) {
    into[2 * row] = placed.originEastM[record]! + forwardM[row]! * sin + offsetM[row]! * cos;
    into[2 * row + 1] = placed.originNorthM[record]! + forwardM[row]! * cos - offsetM[row]! * sin;
  }
}
