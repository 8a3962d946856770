import type { Track } from "@/lib/simulator/drive-path-records";
import { rowPlace } from "@/lib/simulator/describe-truth";
import { measureUnionM2, type Rectangle, sumAreasM2 } from "@/lib/simulator/measure-coverage";
import type { FieldAxes } from "@/lib/simulator/plan-passes";
import type { RowLayout } from "@/lib/simulator/row-layout";
import type { CoverageTruth, PassTruth } from "@/lib/simulator/simulation-truth";

interface Inputs {
  track: Track;
  layout: RowLayout;
  passes: readonly PassTruth[];
  axes: FieldAxes;
}

/** Coverage of straight passes along or across the field axes: one rectangle a row and pass, union taken exactly. */
export function describeCoverage(inputs: Inputs): CoverageTruth {
  const byPass = inputs.passes.map((pass) => rowRectangles(inputs, pass));
  const all = byPass.flat();
  const sweptM2 = sumAreasM2(all);
  const coveredM2 = measureUnionM2(all);
  const alongPasses = byPass.filter((_, index) => isAlong(inputs.axes, inputs.passes[index]?.headingDeg ?? 0));
  return { sweptM2, coveredM2, overlapM2: sweptM2 - coveredM2, skippedM2: sumGapsM2(alongPasses) };
}

function rowRectangles({ track, layout, axes }: Inputs, pass: PassTruth): Rectangle[] {
  const last = pass.firstRecord + pass.records - 1;
  if (pass.records < 2) return [];
  return Array.from({ length: layout.rows }, (_, row) => {
    const second = axes.fromPlane(...rowPlace(track, layout, pass.firstRecord + 1, row));
    const first = axes.fromPlane(...rowPlace(track, layout, pass.firstRecord, row));
    const end = axes.fromPlane(...rowPlace(track, layout, last, row));
    // The first record's cell reaches back as far as the next one's.
    const start: [number, number] = [2 * first[0] - second[0], 2 * first[1] - second[1]];
    const half = layout.spacingM / 2;
    const [halfAlong, halfAcross] = isAlong(axes, pass.headingDeg) ? [0, half] : [half, 0];
    return {
      fromAlongM: Math.min(start[0], end[0]) - halfAlong,
      toAlongM: Math.max(start[0], end[0]) + halfAlong,
      fromAcrossM: Math.min(start[1], end[1]) - halfAcross,
      toAcrossM: Math.max(start[1], end[1]) + halfAcross,
    };
  });
}

function isAlong(axes: FieldAxes, headingDeg: number): boolean {
  return Math.abs(Math.cos((headingDeg * Math.PI) / 180 - axes.headingRad)) > 0.5;
}

/** Ground between the facing edges of neighbouring passes, over the length both have. */
function sumGapsM2(passes: readonly Rectangle[][]): number {
  const hulls = passes.map(hullOf).sort((a, b) => a.fromAcrossM - b.fromAcrossM);
  return hulls.reduce((sum, hull, index) => {
    const next = hulls[index + 1];
    if (!next) return sum;
    const widthM = Math.max(0, next.fromAcrossM - hull.toAcrossM);
    const lengthM = Math.min(next.toAlongM, hull.toAlongM) - Math.max(next.fromAlongM, hull.fromAlongM);
    return sum + (widthM < 1e-6 ? 0 : widthM * Math.max(0, lengthM));
  }, 0);
}

function hullOf(rectangles: readonly Rectangle[]): Rectangle {
  return {
    fromAlongM: Math.min(...rectangles.map((one) => one.fromAlongM)),
    toAlongM: Math.max(...rectangles.map((one) => one.toAlongM)),
    fromAcrossM: Math.min(...rectangles.map((one) => one.fromAcrossM)),
    toAcrossM: Math.max(...rectangles.map((one) => one.toAcrossM)),
  };
}
