import { axialDifferenceDeg } from "@/lib/geo/circular-mean";
import { mainAxisDeg } from "@/lib/passes/main-axis";
import type { Pass } from "@/lib/logs/placed-log";

export interface HeadlandInput {
  passes: Pass[];
  eastM: ArrayLike<number>;
  northM: ArrayLike<number>;
  implementWidthM: number;
  /** Rings of the field boundary in the plane, or null where none is given. */
  boundaryRings: [number, number][][] | null;
}

const OFF_AXIS_DEG = 20;
/** A pass is along the boundary when this share of it lies within one implement width of it. */
const SHARE_NEAR_BOUNDARY = 0.8;

/** Labels (in place) passes that run more than 20 degrees off the main axis, or within one implement width of the boundary. */
export function labelHeadlands(input: HeadlandInput): void {
  const axis = mainAxisDeg(input.passes);
  for (const pass of input.passes) {
    const offAxis = axis !== null && axialDifferenceDeg(pass.headingDeg, axis) > OFF_AXIS_DEG;
    pass.headland = offAxis || runsAlongBoundary(input, pass);
  }
}

function runsAlongBoundary(input: HeadlandInput, pass: Pass): boolean {
  if (!input.boundaryRings) return false;
  const step = Math.max(1, Math.floor(pass.records / 40));
  let near = 0;
  let seen = 0;
  for (let i = pass.first; i < pass.first + pass.records; i += step) {
    const east = input.eastM[i]!;
    const north = input.northM[i]!;
    if (!Number.isFinite(east)) continue;
    seen++;
    if (distanceToRingsM(input.boundaryRings, east, north) <= input.implementWidthM) near++;
  }
  return seen > 0 && near >= SHARE_NEAR_BOUNDARY * seen;
}

function distanceToRingsM(rings: [number, number][][], east: number, north: number): number {
  let best = Infinity;
  for (const ring of rings) {
    for (let k = 1; k < ring.length; k++) best = Math.min(best, distanceToEdgeM(ring[k - 1]!, ring[k]!, east, north));
  }
  return best;
}

// kernel: hot, so positional
function distanceToEdgeM(a: [number, number], b: [number, number], east: number, north: number): number {
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  const along = ((east - a[0]) * dx + (north - a[1]) * dy) / (dx * dx + dy * dy || 1);
  const t = Math.min(1, Math.max(0, along));
  return Math.hypot(east - a[0] - t * dx, north - a[1] - t * dy);
}
