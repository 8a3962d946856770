import { PathBuilder, type PathSegment } from "@/lib/simulator/drive-path";
import type { FieldAxes, PlannedPass } from "@/lib/simulator/plan-passes";

export interface HeadlandRounds {
  rounds: number;
  downInCorners: boolean;
  widthM: number;
  /** Half the sides of the field, in field axes. */
  halfAlongM: number;
  halfAcrossM: number;
}

export interface PathPlan {
  axes: FieldAxes;
  passes: PlannedPass[];
  headland: HeadlandRounds | null;
  turnRadiusM: number;
}

/** Seconds the machine drives unlogged between the headland rounds and the first pass. */
const MOVE_PAUSE_S = 60;

/** The way of the middle of the row line: headland rounds first, then the passes back and forth with lifted turns. */
export function buildPath(plan: PathPlan): PathSegment[] {
  const builder = new PathBuilder();
  let pass = 0;
  if (plan.headland) pass = addHeadlandRounds(builder, plan.axes, plan.headland, plan.turnRadiusM);
  addSerpentine(builder, plan, pass);
  return builder.segments;
}

function addSerpentine(builder: PathBuilder, plan: PathPlan, passesBefore: number): void {
  plan.passes.forEach((line, index) => {
    const forward = index % 2 === 0;
    if (index === 0) {
      const [eastM, northM] = plan.axes.toPlane(line.fromAlongM, line.acrossM);
      builder.moveTo({ eastM, northM, headingRad: plan.axes.headingRad }, passesBefore > 0 ? MOVE_PAUSE_S : 0);
    }
    builder.add(line.toAlongM - line.fromAlongM, 0, passesBefore + index + 1);
    const next = plan.passes[index + 1];
    if (!next) return;
    // Lines end unevenly at a slanted boundary: run out to the farther end, turn, run back in.
    const overrun = forward ? next.toAlongM - line.toAlongM : line.fromAlongM - next.fromAlongM;
    builder.add(Math.max(0, overrun), 0, 0);
    builder.addTurnBack(next.acrossM - line.acrossM, plan.turnRadiusM, forward ? 1 : -1);
    builder.add(Math.max(0, -overrun), 0, 0);
  });
}

/** Clockwise rounds from the corner at the start of the first side; returns the number of the last pass. */
function addHeadlandRounds(builder: PathBuilder, axes: FieldAxes, headland: HeadlandRounds, radiusM: number): number {
  let pass = 0;
  for (let round = 0; round < headland.rounds; round += 1) {
    const insetM = (round + 0.5) * headland.widthM;
    const halfAlong = headland.halfAlongM - insetM;
    const halfAcross = headland.halfAcrossM - insetM;
    const [eastM, northM] = axes.toPlane(-halfAlong - headland.widthM / 2, -halfAcross);
    builder.moveTo({ eastM, northM, headingRad: axes.headingRad }, round > 0 ? MOVE_PAUSE_S : 0);
    if (headland.downInCorners) pass += 1;
    for (let side = 0; side < 4; side += 1) {
      const lengthM = 2 * (side % 2 === 0 ? halfAlong : halfAcross);
      if (headland.downInCorners) addSideThroughCorner(builder, { lengthM, side, pass, radiusM, headland });
      else addSideAndLoop(builder, { lengthM, side, pass: (pass += 1), radiusM, headland });
    }
  }
  return pass;
}

interface Side {
  lengthM: number;
  side: number;
  pass: number;
  radiusM: number;
  headland: HeadlandRounds;
}

/** One straight side, then a lifted three-quarter loop to the left that comes back over the start of the next side. */
function addSideAndLoop(builder: PathBuilder, { lengthM, side, pass, radiusM, headland }: Side): void {
  const loopM = Math.max(radiusM, headland.widthM / 2);
  builder.add(lengthM, 0, pass);
  if (side === 3) return;
  builder.add(headland.widthM / 2 + loopM, 0, 0);
  builder.add(1.5 * Math.PI * loopM, -1 / loopM, 0);
  builder.add(loopM - headland.widthM / 2, 0, 0);
}

/** One side and the corner after it without lifting; the first side also has its run-in of half a width. */
function addSideThroughCorner(builder: PathBuilder, { lengthM, side, pass, radiusM, headland }: Side): void {
  const runInM = side === 0 ? headland.widthM / 2 : -radiusM;
  builder.add(lengthM + runInM - (side === 3 ? 0 : radiusM), 0, pass);
  if (side < 3) builder.add((Math.PI / 2) * radiusM, 1 / radiusM, pass);
}
