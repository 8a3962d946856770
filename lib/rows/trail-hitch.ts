import { RADIANS_PER_DEGREE, turnDegrees, wrapDegrees } from "@/lib/geo/circular-mean";

/** Path of the hitch pin in a plane; one entry a record. */
export interface HitchPath {
  eastM: ArrayLike<number>;
  northM: ArrayLike<number>;
  /** Heading of the towing machine, for the start of each stretch. */
  headingDeg: ArrayLike<number>;
  /** 1 where the path does not continue from the record before. */
  breaks: ArrayLike<number>;
  /** 1 where the towing machine runs backwards. */
  backwards?: ArrayLike<number>;
}

export interface TrailedHeading {
  headingDeg: Float32Array;
  /** 1 until the hitch has travelled three drawbar lengths after a break: the start angle is a guess until then. */
  unsettled: Uint8Array;
  /** 1 where the drawbar stands more than 70 degrees off the course. */
  jackKnifed: Uint8Array;
}

const SETTLED_AFTER_LENGTHS = 3;
const JACK_KNIFE_DEG = 70;

/** Angle between course and drawbar after the hitch moved `stepM` straight on: tan(a1 / 2) = tan(a0 / 2) exp(-ds / L). */
export function relaxHitchAngleDeg(angleDeg: number, stepM: number, lengthM: number): number {
  const half = Math.tan((angleDeg / 2) * RADIANS_PER_DEGREE) * Math.exp(-stepM / lengthM);
  return (2 * Math.atan(half)) / RADIANS_PER_DEGREE;
}

/**
 * Heading of a one-axle trailed implement whose wheels follow `lengthM` behind the hitch pin (tractrix; wheels roll and do
 * not slip sideways), exact for a hitch path of straight steps. Each stretch starts in line with the towing machine.
 * Running backwards has no such answer (any angle grows): the heading is held, and unsettled until three lengths after it.
 */
export function trailHitch(path: HitchPath, lengthM: number): TrailedHeading {
  const records = path.eastM.length;
  const result = {
    headingDeg: new Float32Array(records).fill(NaN),
    unsettled: new Uint8Array(records),
    jackKnifed: new Uint8Array(records),
  };
  let theta = NaN;
  let travelledM = 0;
  let before = -1;
  for (let i = 0; i < records; i++) {
    if (path.breaks[i] === 1) [before, travelledM] = [-1, 0];
    if (Number.isFinite(path.eastM[i]!)) {
      if (before < 0) theta = path.headingDeg[i]!;
      else if (path.backwards?.[i] === 1) travelledM = 0;
      else {
        const east = path.eastM[i]! - path.eastM[before]!;
        const north = path.northM[i]! - path.northM[before]!;
        const stepM = Math.hypot(east, north);
        if (stepM > 0) {
          const course = wrapDegrees(Math.atan2(east, north) / RADIANS_PER_DEGREE);
          const angle = turnDegrees(theta, course);
          if (Math.abs(angle) > JACK_KNIFE_DEG) result.jackKnifed[i] = 1;
          theta = wrapDegrees(course - relaxHitchAngleDeg(angle, stepM, lengthM));
          travelledM += stepM;
        }
      }
      before = i;
    }
    result.headingDeg[i] = theta;
    if (travelledM < SETTLED_AFTER_LENGTHS * lengthM) result.unsettled[i] = 1;
  }
  return result;
}
