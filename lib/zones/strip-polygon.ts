import type { Position } from "geojson";
import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { PassStep } from "@/lib/rows/pass-members";

/** A strip fixed to the machine. */
export interface Strip {
  leftM: number;
  rightM: number;
  forwardM: number;
}

/** A pass drawn with few corners: the steps that a strip of it must bend at. */
export interface PassOutline {
  steps: readonly PassStep[];
  /** Indices into `steps`, ascending. */
  corners: readonly number[];
}

type Point = [number, number];
interface EdgePair {
  left: Point;
  right: Point;
}

/**
 * Steps of a pass that its outer edges bend at, by Douglas and Peucker's rule on both edges at once; whatever lies within
 * `toleranceM` of the line between corners is left out.
 */
export function outlinePass(
  placed: PlacedLog,
  steps: readonly PassStep[],
  { outer, toleranceM }: { outer: Strip; toleranceM: number },
): PassOutline {
  const edges = steps.map((step) => edgeAt(placed, outer, step.record));
  const corners: number[] = [];
  const spans: [number, number][] = [[0, edges.length - 1]];
  for (let span = spans.pop(); span; span = spans.pop()) {
    const [from, to] = span;
    const worst = furthestFromLine(edges, from, to, toleranceM);
    if (worst < 0) continue;
    corners.push(worst);
    spans.push([from, worst], [worst, to]);
  }
  return { steps, corners: corners.sort((a, b) => a - b) };
}

// kernel: hot, so positional
function furthestFromLine(edges: EdgePair[], from: number, to: number, toleranceM: number): number {
  let worst = -1;
  let worstM = toleranceM;
  for (let k = from + 1; k < to; k++) {
    const left = distanceToLineM(edges[k]!.left, edges[from]!.left, edges[to]!.left);
    const right = distanceToLineM(edges[k]!.right, edges[from]!.right, edges[to]!.right);
    if (Math.max(left, right) > worstM) [worst, worstM] = [k, Math.max(left, right)];
  }
  return worst;
}

/**
 * Ring (closed, counter-clockwise for a strip driven straight) of the ground of steps `first .. last` of a pass: from the
 * edge at the record before the first to the edge at the last; the first record of a pass reaches back as far as the next
 * goes on. Degrees to 8 decimals, about a millimetre.
 */
export function stripRing(
  placed: PlacedLog,
  outline: PassOutline,
  { strip, first, last }: { strip: Strip; first: number; last: number },
): Position[] {
  const { steps, corners } = outline;
  const begin = steps[first];
  const end = steps[last];
  if (!begin || !end) return [];
  const between = corners.filter((corner) => corner >= first && corner < last);
  const edges = [
    startEdge(placed, strip, begin),
    ...between.map((corner) => edgeAt(placed, strip, steps[corner]!.record)),
    edgeAt(placed, strip, end.record),
  ];
  const ring = [...edges.map((edge) => edge.right), ...edges.map((edge) => edge.left).reverse()];
  const degrees = ring.map(([east, north]) => placed.plane.toDegrees(east, north).map(roundDegrees));
  return [...degrees, degrees[0]!];
}

function roundDegrees(value: number): number {
  return Math.round(value * 1e8) / 1e8;
}

function startEdge(placed: PlacedLog, strip: Strip, step: PassStep): EdgePair {
  if (step.before >= 0) return edgeAt(placed, strip, step.before);
  const here = edgeAt(placed, strip, step.record);
  const next = edgeAt(placed, strip, step.after);
  return { left: mirror(here.left, next.left), right: mirror(here.right, next.right) };
}

function mirror(centre: Point, point: Point): Point {
  return [2 * centre[0] - point[0], 2 * centre[1] - point[1]];
}

function edgeAt(placed: PlacedLog, strip: Strip, record: number): EdgePair {
  const heading = placed.headingDeg[record]! * RADIANS_PER_DEGREE;
  const sin = Math.sin(heading);
  const cos = Math.cos(heading);
  const east = placed.originEastM[record]! + strip.forwardM * sin;
  const north = placed.originNorthM[record]! + strip.forwardM * cos;
  return {
    left: [east + strip.leftM * cos, north - strip.leftM * sin],
    right: [east + strip.rightM * cos, north - strip.rightM * sin],
  };
}

function distanceToLineM(point: Point, from: Point, to: Point): number {
  const dx = to[0] - from[0];
  const dy = to[1] - from[1];
  const along = ((point[0] - from[0]) * dx + (point[1] - from[1]) * dy) / (dx * dx + dy * dy || 1);
  const t = Math.min(1, Math.max(0, along));
  return Math.hypot(point[0] - from[0] - t * dx, point[1] - from[1] - t * dy);
}

/** The strip between the outer edges of the outermost rows, at the middle of their ranks. */
export function outerStrip({ geometry }: PlacedLog): Strip {
  const lefts = Array.from(geometry.offsetM, (offset, row) => offset - geometry.widthM[row]! / 2);
  const rights = Array.from(geometry.offsetM, (offset, row) => offset + geometry.widthM[row]! / 2);
  const forwardM = geometry.forwardM.reduce((sum, forward) => sum + forward, 0) / geometry.rows;
  return { leftM: Math.min(...lefts), rightM: Math.max(...rights), forwardM };
}
