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

type Point = [number, number];
interface EdgePair {
  left: Point;
  right: Point;
}

/** Corners closer than this to the line between their neighbours are left out: below what a receiver can tell. */
const TOLERANCE_M = 0.02;

/**
 * Ring (closed, counter-clockwise for a strip driven straight) of the ground between two steps of a pass: from the edge at
 * the record before the first to the edge at the last; the first record of a pass reaches back as far as the next goes on.
 */
export function stripRing(placed: PlacedLog, strip: Strip, steps: readonly PassStep[]): Position[] {
  const edges = steps.map((step) => edgeAt(placed, strip, step.record));
  const first = steps[0];
  if (!first || edges.length === 0) return [];
  const start =
    first.before >= 0 ? edgeAt(placed, strip, first.before) : mirror(edges[0]!, edgeAt(placed, strip, first.after));
  const kept = simplifyEdges([start, ...edges]);
  const ring = [...kept.map((edge) => edge.right), ...kept.map((edge) => edge.left).reverse()];
  const degrees = ring.map(([east, north]) =>
    placed.plane.toDegrees(east, north).map((value) => Number(value.toFixed(8))),
  );
  return [...degrees, degrees[0]!];
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

function mirror(about: EdgePair, edge: EdgePair): EdgePair {
  const across = (centre: Point, point: Point): Point => [2 * centre[0] - point[0], 2 * centre[1] - point[1]];
  return { left: across(about.left, edge.left), right: across(about.right, edge.right) };
}

/** Douglas and Peucker's rule on both edges at once, so that corners stay opposite each other. */
function simplifyEdges(edges: EdgePair[]): EdgePair[] {
  const keep = new Uint8Array(edges.length);
  keep[0] = keep[edges.length - 1] = 1;
  const spans: [number, number][] = [[0, edges.length - 1]];
  for (let span = spans.pop(); span; span = spans.pop()) {
    const [from, to] = span;
    let worst = -1;
    let worstM = TOLERANCE_M;
    for (let k = from + 1; k < to; k++) {
      const off = Math.max(
        distanceToLineM(edges[k]!.left, edges[from]!.left, edges[to]!.left),
        distanceToLineM(edges[k]!.right, edges[from]!.right, edges[to]!.right),
      );
      if (off > worstM) [worst, worstM] = [k, off];
    }
    if (worst < 0) continue;
    keep[worst] = 1;
    spans.push([from, worst], [worst, to]);
  }
  return edges.filter((_, k) => keep[k] === 1);
}

function distanceToLineM(point: Point, from: Point, to: Point): number {
  const dx = to[0] - from[0];
  const dy = to[1] - from[1];
  const along = ((point[0] - from[0]) * dx + (point[1] - from[1]) * dy) / (dx * dx + dy * dy || 1);
  const t = Math.min(1, Math.max(0, along));
  return Math.hypot(point[0] - from[0] - t * dx, point[1] - from[1] - t * dy);
}
