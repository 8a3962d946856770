import { RADIANS_PER_DEGREE, turnDegrees, wrapDegrees } from "@/lib/geo/circular-mean";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { passSteps, type PassStep } from "@/lib/rows/pass-members";

/** A part of a pass that is about straight: what overlap is judged by. */
export interface Stretch {
  pass: Pass;
  steps: PassStep[];
  startedAtMs: number;
  endedAtMs: number;
  /** From its first place to its last; the machine's heading where it is a single record. */
  headingDeg: number;
  /** Its middle, where the implement's centre line meets the line of rows. */
  eastM: number;
  northM: number;
}

const STRAIGHT = { turnDeg: 10, lengthM: 40 };

/** All passes in time order, each cut where it has turned by 10 degrees or run 40 m. Lone records draw no ground. */
export function passStretches(placed: PlacedLog): Stretch[] {
  return [...placed.passes]
    .sort((a, b) => a.pass - b.pass)
    .flatMap((pass) => {
      const steps = passSteps(placed, pass).filter((step) => step.before >= 0 || step.after >= 0);
      return cutSteps(placed, steps).map((part) => describeStretch(placed, pass, part));
    });
}

function cutSteps(placed: PlacedLog, steps: PassStep[]): PassStep[][] {
  const parts: PassStep[][] = [];
  let first = 0;
  for (let k = 1; k <= steps.length; k++) {
    if (k < steps.length && continues(placed, steps[first]!.record, steps[k]!.record)) continue;
    parts.push(steps.slice(first, k));
    first = k;
  }
  return steps.length > 0 ? parts : [];
}

function continues(placed: PlacedLog, from: number, to: number): boolean {
  const turn = turnDegrees(placed.headingDeg[from]!, placed.headingDeg[to]!);
  return Math.abs(turn) <= STRAIGHT.turnDeg && !(distanceM(placed, from, to) > STRAIGHT.lengthM);
}

function distanceM(placed: PlacedLog, from: number, to: number): number {
  const { originEastM, originNorthM } = placed;
  return Math.hypot(originEastM[to]! - originEastM[from]!, originNorthM[to]! - originNorthM[from]!);
}

function describeStretch(placed: PlacedLog, pass: Pass, steps: PassStep[]): Stretch {
  const { originEastM: east, originNorthM: north } = placed;
  const a = steps[0]!.before >= 0 ? steps[0]!.before : steps[0]!.record;
  const b = steps[steps.length - 1]!.record;
  const course = Math.atan2(east[b]! - east[a]!, north[b]! - north[a]!) / RADIANS_PER_DEGREE;
  return {
    pass,
    steps,
    startedAtMs: placed.log.timeMs[a]!,
    endedAtMs: placed.log.timeMs[b]!,
    headingDeg: distanceM(placed, a, b) > 0 ? wrapDegrees(course) : placed.headingDeg[b]!,
    eastM: (east[a]! + east[b]!) / 2,
    northM: (north[a]! + north[b]!) / 2,
  };
}
