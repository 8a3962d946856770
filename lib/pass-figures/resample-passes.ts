import { DRAWS, drawPasses, type DrawnMeans } from "@/lib/pass-figures/draw-passes";
import { quantileType7 } from "@/lib/statistics/quantile";

/** Fewer passes than this give no interval: they are the units that repeat, not the readings. */
export const LEAST_PASSES = 8;
const SEED = 20_311_014;

/** Weighted sums of parts of a log, pass by pass: `sums[pass * parts + part]` over `weights[...]` is the pass's own mean. */
export interface PassSums {
  passes: number;
  parts: number;
  sums: Float64Array;
  weights: Float64Array;
}

export function emptySums(passes: number, parts: number): PassSums {
  return { passes, parts, sums: new Float64Array(passes * parts), weights: new Float64Array(passes * parts) };
}

// kernel: hot, so positional
export function addReading(into: PassSums, pass: number, part: number, value: number, weight: number): void {
  const at = pass * into.parts + part;
  into.sums[at]! += weight * value;
  into.weights[at]! += weight;
}

/** Mean of each part over all passes, weighted; NaN for a part without weight. */
export function partMeans({ passes, parts, sums, weights }: PassSums): Float64Array {
  return Float64Array.from({ length: parts }, (_, part) => {
    let [sum, weight] = [0, 0];
    for (let at = part; at < passes * parts; at += parts) {
      sum += sums[at]!;
      weight += weights[at]!;
    }
    return weight > 0 ? sum / weight : NaN;
  });
}

/** Passes that have weight in a part. */
export function passesIn({ passes, parts, weights }: PassSums, part: number): number {
  let n = 0;
  for (let pass = 0; pass < passes; pass++) n += +(weights[pass * parts + part]! > 0);
  return n;
}

/** Draws single passes with replacement, always the same way. */
export function resamplePasses(given: PassSums): DrawnMeans {
  return drawPasses(given, { passesPerBlock: 1, seed: SEED, label: "passes" });
}

/** The middle 95 % of one part's means. */
export function partInterval({ parts, means }: DrawnMeans, part: number): [number, number] | null {
  return middle(Float64Array.from({ length: DRAWS }, (_, draw) => means[draw * parts + part]!));
}

/** The same of one part's mean less another's in the same draw. */
export function differenceInterval(
  { parts, means }: DrawnMeans,
  first: number,
  second: number,
): [number, number] | null {
  return middle(
    Float64Array.from({ length: DRAWS }, (_, draw) => means[draw * parts + first]! - means[draw * parts + second]!),
  );
}

/** Null where a part was missing from more than one draw in twenty: too few passes have it. */
function middle(drawn: Float64Array): [number, number] | null {
  const known = drawn.filter((value) => Number.isFinite(value)).sort();
  if (known.length < 0.95 * DRAWS) return null;
  return [quantileType7(known, 0.025), quantileType7(known, 0.975)];
}
