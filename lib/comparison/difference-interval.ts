import { DRAWS } from "@/lib/pass-figures/draw-passes";
import { median } from "@/lib/statistics/median";
import { quantileType7 } from "@/lib/statistics/quantile";

/** Normal quantile of 97.5 %. */
const Z = 1.959964;

/** A figure of one log: as it is, and in every draw. */
export interface DrawnFigure {
  value: number;
  drawn: Float64Array;
  blocks: number;
}

/** Quantile of Student's t at 97.5 % by the first terms of its expansion about the normal (Abramowitz and Stegun 26.7.5); within 0.3 % from 4 degrees of freedom on. */
export function studentT975(freedom: number): number {
  const first = (Z ** 3 + Z) / 4;
  const second = (5 * Z ** 5 + 16 * Z ** 3 + 3 * Z) / 96;
  const third = (3 * Z ** 7 + 19 * Z ** 5 + 17 * Z ** 3 - 15 * Z) / 384;
  return Z + first / freedom + second / freedom ** 2 + third / freedom ** 3;
}

function variance(values: Float64Array): number {
  let mean = 0;
  for (const value of values) mean += value / values.length;
  let sum = 0;
  for (const value of values) sum += (value - mean) ** 2;
  return sum / (values.length - 1);
}

/** How much wider than the draws spread an interval of few blocks must be: a bootstrap of n blocks spreads (n - 1)/n of the variance. */
function widen({ blocks }: DrawnFigure): number {
  return Math.sqrt(blocks / (blocks - 1));
}

/** Student's t over the normal for the difference of two logs, with the degrees of freedom of Welch and Satterthwaite. */
function studentFactor(before: DrawnFigure, after: DrawnFigure): number {
  const [a, b] = [variance(before.drawn), variance(after.drawn)];
  const freedom = (a + b) ** 2 / (a ** 2 / (before.blocks - 1) + b ** 2 / (after.blocks - 1));
  return Number.isFinite(freedom) ? studentT975(Math.max(1, freedom)) / Z : 1;
}

/** After less before in every draw, about the difference itself, widened for few blocks. Draws that lack either are NaN. */
function spreadDraws(before: DrawnFigure, after: DrawnFigure): Float64Array {
  const [wideBefore, wideAfter] = [widen(before), widen(after)];
  return Float64Array.from(
    { length: DRAWS },
    (_, draw) => wideAfter * (after.drawn[draw]! - after.value) - wideBefore * (before.drawn[draw]! - before.value),
  );
}

/** 95 % interval of after less before: percentiles of the draws, widened for few blocks. Null where a draw in twenty lacks one. */
export function differenceInterval(before: DrawnFigure, after: DrawnFigure): [number, number] | null {
  const spread = spreadDraws(before, after)
    .filter((value) => Number.isFinite(value))
    .sort();
  const difference = after.value - before.value;
  if (!Number.isFinite(difference) || spread.length < 0.95 * DRAWS) return null;
  const factor = studentFactor(before, after);
  return [difference + factor * quantileType7(spread, 0.025), difference + factor * quantileType7(spread, 0.975)];
}

export interface BeyondOthers {
  value: number;
  interval: [number, number];
}

/**
 * Each row's difference less the middle row's, with intervals that hold for all rows together: the widest scaled step of any row
 * in each draw sets how many standard errors are given to all of them. Rows without readings in either log are null.
 */
export function beyondOthers(before: DrawnFigure[], after: DrawnFigure[]): (BeyondOthers | null)[] {
  const differences = before.map((row, k) => after[k]!.value - row.value);
  const values = lessMiddle(differences);
  const known = values.flatMap((value, row) => (Number.isFinite(value) ? [row] : []));
  if (known.length < 3) return values.map(() => null);
  const factor = Math.max(...known.map((row) => studentFactor(before[row]!, after[row]!)));
  const spreads = before.map((row, k) => spreadDraws(row, after[k]!));
  const drawn = known.map(() => new Float64Array(DRAWS));
  for (let draw = 0; draw < DRAWS; draw++) {
    const steps = lessMiddle(differences.map((difference, row) => difference + spreads[row]![draw]!));
    known.forEach((row, k) => (drawn[k]![draw] = steps[row]! - values[row]!));
  }
  const errors = drawn.map((one) => Math.sqrt(variance(one.filter((value) => Number.isFinite(value)))));
  const widest = Float64Array.from({ length: DRAWS }, (_, draw) =>
    Math.max(...drawn.map((one, k) => (errors[k]! > 0 ? Math.abs(one[draw]!) / errors[k]! : 0))),
  ).filter((value) => Number.isFinite(value));
  if (widest.length < 0.95 * DRAWS) return values.map(() => null);
  const reach = factor * quantileType7(widest.sort(), 0.95);
  return values.map((value, row) => {
    const k = known.indexOf(row);
    if (k < 0) return null;
    const half = reach * errors[k]!;
    return { value, interval: [value - half, value + half] };
  });
}

function lessMiddle(values: number[]): number[] {
  const middle = median(values.filter((value) => Number.isFinite(value)));
  return values.map((value) => value - middle);
}
