import { stepBounds, visitStepCells, type CellFrame } from "@/lib/coverage/pass-cells";
import type { Bounds } from "@/lib/coverage/bit-grid";
import { fillQuad } from "@/lib/coverage/fill-quad";
import { passStretches, type Stretch } from "@/lib/coverage/pass-stretches";
import { groupRows } from "@/lib/coverage/row-groups";
import { findSwitchedOff } from "@/lib/coverage/switched-off";
import { addStretch, createWorkedGrid, openWindow, type VisitAgain, type WorkedGrid } from "@/lib/coverage/worked-grid";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { mainAxisDeg } from "@/lib/passes/main-axis";

/**
 * The grid stands at this angle to the passes: along them, a whole edge would fall to one side of a line of cell centres
 * and the errors would add up; aslant they cancel.
 */
const GRID_TURN_DEG = 31;
const CELLS_PER_SPACING = 2.5;
/** The default takes 64 MB for the cells and as much for who worked them. */
const MAX_CELLS = 2 ** 29;

export interface DrawnPasses {
  worked: WorkedGrid;
  frame: CellFrame;
  stretches: Stretch[];
}

/**
 * Draws all passes in time order on a grid finer than half a row spacing, and tells of all ground that a later stretch worked
 * again. Null where no pass has ground.
 */
export function drawPasses(
  placed: PlacedLog,
  options: { maxCells?: number; switchedOff?: Uint8Array | null; visit: VisitAgain },
): DrawnPasses | null {
  const { maxCells = MAX_CELLS, switchedOff = findSwitchedOff(placed), visit } = options;
  const xAxisDeg = (mainAxisDeg(placed.passes) ?? 0) + GRID_TURN_DEG;
  const frame: CellFrame = { groups: groupRows(placed.geometry), xAxisDeg, switchedOff };
  const stretches = passStretches(placed);
  const boxes = stretches.map((stretch) => stepBounds(placed, frame, stretch.steps));
  const bounds = joinBounds(boxes);
  if (!bounds) return null;
  const spacingM = Math.min(...placed.geometry.widthM);
  const worked = createWorkedGrid(bounds, spacingM / CELLS_PER_SPACING, maxCells);
  stretches.forEach((stretch, number) => {
    const box = boxes[number];
    if (!box) return;
    const window = openWindow(worked.cells, box);
    visitStepCells(placed, frame, stretch.steps, (quad) => fillQuad(window.grid, quad));
    addStretch(worked, window, number, visit);
  });
  return { worked, frame, stretches };
}

function joinBounds(boxes: readonly (Bounds | null)[]): Bounds | null {
  return boxes.reduce<Bounds | null>((whole, box) => {
    if (!whole || !box) return whole ?? box;
    return {
      minX: Math.min(whole.minX, box.minX),
      minY: Math.min(whole.minY, box.minY),
      maxX: Math.max(whole.maxX, box.maxX),
      maxY: Math.max(whole.maxY, box.maxY),
    };
  }, null);
}
