import { findReversing } from "@/lib/build/find-reversing";
import { circularMean, turnDegrees, wrapDegrees } from "@/lib/geo/circular-mean";
import { HOLD_HEADING_BELOW_MPS, headingFromTrack, holdLast } from "@/lib/geo/heading-from-track";
import { medianStepSeconds } from "@/lib/cleaning/position-steps";
import type { LogNote, MachineLog } from "@/lib/logs/machine-log";
import { drivableM, longestStepS } from "@/lib/passes/drivable-distance";
import { median } from "@/lib/statistics/median";

export interface Motion {
  headingDeg: Float32Array;
  speedMps: Float32Array;
  /** 1 where the track does not continue from the last record with a position. */
  breaks: Uint8Array;
  /** 1 where the machine runs backwards; its heading is that of its front all the same. */
  backwards: Uint8Array;
  notes: LogNote[];
}

interface Positions {
  eastM: Float64Array;
  northM: Float64Array;
}

/** A silence longer than this breaks the track, whatever the machine did meanwhile. */
const TRACK_GAP_S = 10;
/** A logged heading further than this from the track on the whole is not a heading of this machine. */
const HEADING_DISAGREES_DEG = 30;

/** Heading (of the machine's front) and speed of the antenna: as logged where the log has them, from the track elsewhere. */
export function measureMotion(log: MachineLog, positions: Positions, works?: Uint8Array): Motion {
  const breaks = trackBreaks(log, positions);
  const speedMps = fillSpeed(log, positions, breaks);
  const reversing = findReversing({ ...positions, speedMps, timeMs: log.timeMs, works: works ?? [], breaks });
  const { backwards, cusps } = reversing;
  const stretches = breaks.map((isBreak, i) => (isBreak === 1 || cusps[i] === 1 ? 1 : 0));
  const course = headingFromTrack({ ...positions, speedMps, breaks: stretches });
  const front = frontOf(course, { ...positions, speedMps, backwards });
  const notes: LogNote[] = [];
  const logged = log.headingDeg && checkHeading(log, { course, speedMps, notes }) ? log.headingDeg : null;
  if (!logged) return { headingDeg: fillStart(front), speedMps, breaks, backwards, notes };
  const opposed = Uint8Array.from(logged, (heading, i) =>
    opposes(heading, course[i]!) && speedMps[i]! > MOVING_MPS ? 1 : 0,
  );
  // A receiver that logs its course flips with it; one that logs the machine's heading does not.
  const isCourse = backwards.some(
    (back, i) => back === 1 && !opposes(logged[i]!, course[i]!) && speedMps[i]! > MOVING_MPS,
  );
  const headingDeg = Float32Array.from(logged, (heading, i) => {
    if (speedMps[i]! < HOLD_HEADING_BELOW_MPS) return NaN;
    if (!Number.isFinite(heading)) return front[i]!;
    return isCourse && backwards[i] === 1 ? wrapDegrees(heading + 180) : heading;
  });
  holdLast(headingDeg);
  const either = isCourse ? backwards : backwards.map((back, i) => back | longOpposed(opposed, i));
  return { headingDeg: fillStart(headingDeg), speedMps, breaks, backwards: either, notes };
}

/** The way the machine's front points where it moves along a course; held where it stands. */
function frontOf(
  course: Float32Array,
  { eastM, speedMps, backwards }: Pick<Motion, "speedMps" | "backwards"> & Positions,
): Float32Array {
  const front = course.map((heading, i) => {
    if (speedMps[i]! < HOLD_HEADING_BELOW_MPS || !Number.isFinite(eastM[i]!)) return NaN;
    return backwards[i] === 1 ? wrapDegrees(heading + 180) : heading;
  });
  holdLast(front);
  return front;
}

/** From this speed on a course from positions is sure. */
const MOVING_MPS = 2 * HOLD_HEADING_BELOW_MPS;
/** A machine whose heading and course stand further apart than this runs backwards. */
const OPPOSED_DEG = 120;

function opposes(headingDeg: number, courseDeg: number): boolean {
  return Math.abs(turnDegrees(headingDeg, courseDeg)) > OPPOSED_DEG;
}

/** 1 where a record and one beside it oppose the course: a single one is a flaw of the log. */
function longOpposed(opposed: Uint8Array, i: number): number {
  return opposed[i] === 1 && (opposed[i - 1] === 1 || opposed[i + 1] === 1) ? 1 : 0;
}

/** Records before the first known heading take that one, so that a log does not lose its first metres. */
function fillStart(headingDeg: Float32Array): Float32Array {
  const first = headingDeg.findIndex((heading) => Number.isFinite(heading));
  if (first > 0) headingDeg.fill(headingDeg[first]!, 0, first);
  return headingDeg;
}

function trackBreaks(log: MachineLog, { eastM, northM }: Positions): Uint8Array {
  const breaks = new Uint8Array(log.records);
  const steps = stepLengths({ eastM, northM });
  const limitM = Math.max(3, 3 * (median(steps.filter((step) => step > 0)) || 0));
  const maxS = longestStepS(log.timeMs);
  const track = { eastM, northM, timeMs: log.timeMs, speedMps: log.speedMps };
  let last = -1;
  for (let i = 0; i < log.records; i++) {
    if (!Number.isFinite(eastM[i]!)) continue;
    const metres = Math.hypot(eastM[i]! - eastM[last]!, northM[i]! - northM[last]!);
    const far = metres > limitM * (i - last) && metres > drivableM(track, { from: last, to: i, maxS });
    const late = last >= 0 && log.timeMs[i]! - log.timeMs[last]! > TRACK_GAP_S * 1000;
    if (last < 0 || far || late) breaks[i] = 1;
    last = i;
  }
  return breaks;
}

function stepLengths({ eastM, northM }: Positions): Float64Array {
  return Float64Array.from({ length: eastM.length }, (_, i) =>
    i === 0 ? NaN : Math.hypot(eastM[i]! - eastM[i - 1]!, northM[i]! - northM[i - 1]!),
  );
}

/** Logged speed, and for records without one the distance over the time of the two steps about it. */
function fillSpeed(log: MachineLog, { eastM, northM }: Positions, breaks: Uint8Array): Float32Array {
  const usualS = medianStepSeconds(log.timeMs);
  return Float32Array.from({ length: log.records }, (_, i) => {
    const logged = log.speedMps?.[i] ?? NaN;
    if (Number.isFinite(logged)) return logged;
    const from = i > 0 && breaks[i] !== 1 ? i - 1 : i;
    const to = i + 1 < log.records && breaks[i + 1] !== 1 ? i + 1 : i;
    if (from === to) return NaN;
    const seconds = (log.timeMs[to]! - log.timeMs[from]!) / 1000;
    const metres = Math.hypot(eastM[to]! - eastM[from]!, northM[to]! - northM[from]!);
    return metres / (seconds > 0 ? seconds : usualS * (to - from));
  });
}

interface HeadingCheck {
  course: Float32Array;
  speedMps: Float32Array;
  notes: LogNote[];
}

/** False (with a note) where the logged heading is not the direction of travel. */
function checkHeading(log: MachineLog, { course, speedMps, notes }: HeadingCheck): boolean {
  const differences = Float64Array.from(course, (track, i) => {
    const moving = speedMps[i]! > 2 * HOLD_HEADING_BELOW_MPS || Number.isNaN(speedMps[i]!);
    return moving ? turnDegrees(track, log.headingDeg?.[i] ?? NaN) : NaN;
  });
  const mean = circularMean(differences);
  const compared = differences.filter((difference) => !Number.isNaN(difference)).length;
  if (!mean || compared < 10) return true;
  const offset = turnDegrees(0, mean.meanDeg);
  if (mean.resultant > 0.7 && Math.abs(offset) <= HEADING_DISAGREES_DEG) return true;
  const message =
    mean.resultant > 0.7
      ? `The logged heading is ${Math.round(offset)} degrees off the direction of travel all along, so the direction of travel is used.`
      : "The logged heading does not follow the direction of travel, so the direction of travel is used.";
  notes.push({ code: "heading-not-used", message, count: compared });
  return false;
}
