import type { Bounds } from "@/lib/coverage/bit-grid";
import { groupRows, type RowGroup } from "@/lib/coverage/row-groups";
import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { passSteps, type PassStep } from "@/lib/rows/pass-members";

/** Corners of one cell as x, y four times round; overwritten by the next. */
export type Quad = Float64Array;

/** The strips to draw, and where the x axis of the drawing points. */
export interface CellFrame {
  groups: RowGroup[];
  xAxisDeg: number;
  /** 1 where a row was switched off, laid out like a channel. */
  switchedOff?: Uint8Array | null;
}

/**
 * Calls `visit` with the ground of every working record and strip: from its edges at the record before to its edges at the
 * record, in a frame whose x axis points along `xAxisDeg`. The first record of a pass reaches back as far as the next one
 * goes on.
 */
export function visitCells(placed: PlacedLog, frame: CellFrame, visit: (quad: Quad) => void): void {
  for (const pass of placed.passes) {
    const steps = passSteps(placed, pass).filter((step) => step.before >= 0 || step.after >= 0);
    visitStepCells(placed, frame, steps, visit);
  }
}

/** The same for some steps of a pass; without the rows that were switched off, where the frame says so. */
export function visitStepCells(
  placed: PlacedLog,
  frame: CellFrame,
  steps: readonly PassStep[],
  visit: (quad: Quad) => void,
): void {
  const quad = new Float64Array(8);
  const turn = {
    sin: Math.sin(frame.xAxisDeg * RADIANS_PER_DEGREE),
    cos: Math.cos(frame.xAxisDeg * RADIANS_PER_DEGREE),
  };
  for (const step of steps) {
    for (const group of groupsAt(placed, frame, step.record)) {
      writeEdge(placed, group, step.record, { quad, at: 4, turn });
      if (step.before >= 0) writeEdge(placed, group, step.before, { quad, at: 0, turn });
      else {
        writeEdge(placed, group, step.after, { quad, at: 0, turn });
        // Edges run right to left in the second half, left to right in the first: mirror about the record's own edge.
        quad[0] = 2 * quad[6]! - quad[0]!;
        quad[1] = 2 * quad[7]! - quad[1]!;
        quad[2] = 2 * quad[4]! - quad[2]!;
        quad[3] = 2 * quad[5]! - quad[3]!;
      }
      visit(quad);
    }
  }
}

function groupsAt(placed: PlacedLog, { groups, switchedOff }: CellFrame, record: number): RowGroup[] {
  if (!switchedOff) return groups;
  const { rows } = placed.geometry;
  const off = switchedOff.subarray(record * rows, (record + 1) * rows);
  return off.includes(1) ? groupRows(placed.geometry, (row) => off[row] === 1) : groups;
}

interface EdgeTarget {
  quad: Quad;
  /** 0: left then right edge; 4: right then left, so that the four corners go round. */
  at: 0 | 4;
  turn: { sin: number; cos: number };
}

// kernel: hot, so positional
function writeEdge(placed: PlacedLog, group: RowGroup, record: number, { quad, at, turn }: EdgeTarget): void {
  const heading = placed.headingDeg[record]! * RADIANS_PER_DEGREE;
  const sin = Math.sin(heading);
  const cos = Math.cos(heading);
  const east = placed.originEastM[record]! + group.forwardM * sin;
  const north = placed.originNorthM[record]! + group.forwardM * cos;
  const near = at === 0 ? group.leftM : group.rightM;
  const far = at === 0 ? group.rightM : group.leftM;
  writePoint(quad, at, { east: east + near * cos, north: north - near * sin }, turn);
  writePoint(quad, at + 2, { east: east + far * cos, north: north - far * sin }, turn);
}

// kernel: hot, so positional
function writePoint(
  quad: Quad,
  at: number,
  point: { east: number; north: number },
  turn: { sin: number; cos: number },
): void {
  quad[at] = point.east * turn.sin + point.north * turn.cos;
  quad[at + 1] = point.north * turn.sin - point.east * turn.cos;
}

/** The box around all cells; null where there are none. */
export function cellBounds(placed: PlacedLog, frame: CellFrame): Bounds | null {
  return boundsOf((grow) => visitCells(placed, frame, grow));
}

/** The box around the cells of some steps; null where there are none. */
export function stepBounds(placed: PlacedLog, frame: CellFrame, steps: readonly PassStep[]): Bounds | null {
  return boundsOf((grow) => visitStepCells(placed, frame, steps, grow));
}

function boundsOf(draw: (grow: (quad: Quad) => void) => void): Bounds | null {
  const bounds = { minX: Infinity, minY: Infinity, maxX: -Infinity, maxY: -Infinity };
  draw((quad) => {
    for (let k = 0; k < 8; k += 2) {
      bounds.minX = Math.min(bounds.minX, quad[k]!);
      bounds.maxX = Math.max(bounds.maxX, quad[k]!);
      bounds.minY = Math.min(bounds.minY, quad[k + 1]!);
      bounds.maxY = Math.max(bounds.maxY, quad[k + 1]!);
    }
  });
  return Number.isFinite(bounds.minX) ? bounds : null;
}
