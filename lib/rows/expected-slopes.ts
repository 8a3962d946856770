import { axialDifferenceDeg, RADIANS_PER_DEGREE, turnDegrees } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { fitSlope, intoFrame, type TravelFrame } from "@/lib/rows/edge-slope";

type Ring = [eastM: number, northM: number][];

/** An end of a pass, reduced to one place: the middle of its rows. */
export interface PassEnd {
  pass: number;
  startedAtMs: number;
  end: "start" | "finish";
  frame: TravelFrame;
}

interface Reach {
  widthM: number;
  offsetM: ArrayLike<number>;
}

/** How far past the switching point the boundary may lie: a headland of some widths may be left before it. */
const BOUNDARY_WIDTHS = 4;
const BOUNDARY_MORE_M = 10;
/** Section control may be this far off the edge of ground that was worked before. */
const WORKED_EDGE_M = 3;
const CROSSING_DEG = 15;

/** Slope of the boundary where the rows' lines of travel cross it nearest to the end of the pass; null far from it. */
export function boundarySlope(rings: readonly Ring[], { frame }: PassEnd, { widthM, offsetM }: Reach): number | null {
  const reachM = BOUNDARY_WIDTHS * widthM + BOUNDARY_MORE_M;
  const turned = rings.map((ring) => ring.map(([east, north]) => intoFrame(frame, east, north)));
  const crossings = Array.from(offsetM).flatMap((acrossM) => {
    let nearest = Infinity;
    for (const ring of turned) {
      for (let k = 1; k < ring.length; k++) {
        const [a, b] = [ring[k - 1]!, ring[k]!];
        if (a.acrossM <= acrossM === b.acrossM <= acrossM) continue;
        const alongM = a.alongM + ((acrossM - a.acrossM) / (b.acrossM - a.acrossM)) * (b.alongM - a.alongM);
        if (Math.abs(alongM) < Math.abs(nearest)) nearest = alongM;
      }
    }
    return Math.abs(nearest) <= reachM ? [{ alongM: nearest, acrossM }] : [];
  });
  return crossings.length < offsetM.length / 2 ? null : (fitSlope(crossings)?.slope ?? null);
}

/** Slope of the edge of ground that an earlier pass worked across this one's end; null where none did. */
export function workedSlope(placed: PlacedLog, passEnd: PassEnd, { widthM }: Reach): number | null {
  const { frame } = passEnd;
  let least = widthM / 2 + WORKED_EDGE_M;
  let slope: number | null = null;
  for (const pass of placed.passes) {
    if (!(pass.startedAtMs < passEnd.startedAtMs)) continue;
    if (axialDifferenceDeg(pass.headingDeg, frame.headingDeg) < CROSSING_DEG) continue;
    for (let i = pass.first; i < pass.first + pass.records; i++) {
      if (placed.passOf[i] !== pass.pass) continue;
      const apartM = Math.hypot(placed.originEastM[i]! - frame.eastM, placed.originNorthM[i]! - frame.northM);
      if (!(apartM < least)) continue;
      least = apartM;
      slope = 1 / Math.tan(turnDegrees(frame.headingDeg, placed.headingDeg[i]!) * RADIANS_PER_DEGREE);
    }
  }
  return slope;
}

/**
 * Slope of the line through this end and the ends of the nearest passes beside it, those driven the same way first, since
 * late switching moves the ends of the two directions apart.
 */
export function neighbourSlope(ends: readonly PassEnd[], own: PassEnd, { widthM }: Reach): number | null {
  const beside = ends
    .filter((other) => axialDifferenceDeg(other.frame.headingDeg, own.frame.headingDeg) < CROSSING_DEG)
    .map((other) => ({ other, ...intoFrame(own.frame, other.frame.eastM, other.frame.northM) }))
    .filter(({ acrossM, alongM }) => {
      const offM = Math.abs(acrossM);
      return offM > 0.3 * widthM && offM < 2.6 * widthM && Math.abs(alongM) < 3 * offM;
    });
  const sameWay = beside.filter(
    ({ other }) =>
      other.end === own.end && Math.abs(turnDegrees(other.frame.headingDeg, own.frame.headingDeg)) < CROSSING_DEG,
  );
  const chosen = sameWay.length > 0 ? sameWay : beside;
  return fitSlope([{ alongM: 0, acrossM: 0 }, ...chosen], 2)?.slope ?? null;
}
