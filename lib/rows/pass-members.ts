import type { Pass, PlacedLog } from "@/lib/logs/placed-log";

/** A working record of a pass and its neighbours in it (any with a position, working or not); -1 where there is none. */
export interface PassStep {
  record: number;
  before: number;
  after: number;
}

/**
 * Working records of a pass, each with the record its distance is counted from: the nearest earlier one of the pass with a
 * position, working or not, so that ground passed over in a bridged drop-out counts for nobody.
 */
export function passSteps(placed: PlacedLog, pass: Pass): PassStep[] {
  const steps: PassStep[] = [];
  let before = -1;
  for (let i = pass.first; i < pass.first + pass.records; i++) {
    if (!Number.isFinite(placed.originEastM[i]!) || !Number.isFinite(placed.headingDeg[i]!)) continue;
    const previous = steps[steps.length - 1];
    if (previous && previous.record === before) previous.after = i;
    if (placed.passOf[i] === pass.pass) steps.push({ record: i, before, after: -1 });
    before = i;
  }
  return steps;
}
