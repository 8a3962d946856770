import { circularMean, turnDegrees } from "@/lib/geo/circular-mean";
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

/** Heading and speed of the antenna: as logged where the log has them, from the track elsewhere. */
export function measureMotion(log: MachineLog, positions: Positions): Motion {
  const breaks = trackBreaks(log, positions);
  const speedMps = fillSpeed(log, positions, breaks);
  const course = headingFromTrack({ ...positions, speedMps, breaks });
  const notes: LogNote[] = [];
  const logged = log.headingDeg && checkHeading(log, { course, speedMps, notes }) ? log.headingDeg : null;
  if (!logged) return { headingDeg: fillStart(course), speedMps, breaks, notes };
  const headingDeg = Float32Array.from(logged, (heading, i) => {
    if (speedMps[i]! < HOLD_HEADING_BELOW_MPS) return NaN;
    return Number.isFinite(heading) ? heading : course[i]!;
  });
  holdLast(headingDeg);
  return { headingDeg: fillStart(headingDeg), speedMps, breaks, notes };
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
