import type { PassBody } from "@/lib/schemas/logs";

/** When a pass was worked, seconds since the log began, and how long had been worked before it. */
interface WorkedPass {
  pass: number;
  startS: number;
  endS: number;
  workedBeforeS: number;
}

/** The time at work: passes end to end in the order they were driven, without the turns and breaks between them. */
export interface WorkClock {
  passes: readonly WorkedPass[];
  totalS: number;
}

/** Null where the log does not say when its passes were driven. */
export function buildWorkClock(passes: readonly PassBody[], logStartedAt: string | null): WorkClock | null {
  const beganMs = Date.parse(logStartedAt ?? "");
  const timed = passes
    .map(({ pass, startedAt, endedAt }) => ({
      pass,
      startS: (Date.parse(startedAt ?? "") - beganMs) / 1000,
      endS: (Date.parse(endedAt ?? "") - beganMs) / 1000,
    }))
    .filter(({ startS, endS }) => endS >= startS)
    .sort((a, b) => a.startS - b.startS);
  let workedBeforeS = 0;
  const worked = timed.map((pass) => {
    const before = workedBeforeS;
    workedBeforeS += pass.endS - pass.startS;
    return { ...pass, workedBeforeS: before };
  });
  return workedBeforeS > 0 ? { passes: worked, totalS: workedBeforeS } : null;
}

/** Seconds worked until a moment. */
export function workedUntil(clock: WorkClock, timeS: number): number {
  return clock.passes.reduce((sum, { startS, endS }) => sum + Math.min(Math.max(0, timeS - startS), endS - startS), 0);
}

/** The moment until which so much had been worked; within the log. */
export function momentOf(clock: WorkClock, workedS: number): number {
  const within = Math.min(clock.totalS, Math.max(0, workedS));
  const pass = clock.passes.findLast(({ workedBeforeS }) => workedBeforeS <= within);
  return pass ? pass.startS + Math.min(within - pass.workedBeforeS, pass.endS - pass.startS) : 0;
}

/** The pass under way at a moment, or between two the one driven last; before the first, the first. */
export function passAtMoment(clock: WorkClock, timeS: number): number | null {
  const pass = clock.passes.findLast(({ startS }) => startS <= timeS) ?? clock.passes[0];
  return pass?.pass ?? null;
}

/** How much of a pass had been worked at a moment, 0 to 1; a pass without times counts as worked. */
export function shareWorked(clock: WorkClock, pass: number, timeS: number): number {
  const found = clock.passes.find((candidate) => candidate.pass === pass);
  if (!found) return 1;
  const { startS, endS } = found;
  return endS > startS ? Math.min(1, Math.max(0, (timeS - startS) / (endS - startS))) : Number(timeS >= endS);
}

/** The last record of a pass that was logged by a moment; -1 where none was. Records without a time count as logged. */
export function recordAtMoment(timesS: ArrayLike<number>, timeS: number): number {
  let record = -1;
  for (let i = 0; i < timesS.length; i += 1) {
    if (timesS[i]! > timeS) break;
    record = i;
  }
  return record;
}
