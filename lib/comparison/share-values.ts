import { eachReading, type ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import { niceStep } from "@/lib/comparison/nice-step";
import type { ComparisonBody } from "@/lib/schemas/comparison";

/** Classes of a distribution, about so many. */
const CLASSES = 32;
/** Finer classes, to find where the bulk of the distance lies. */
const FINE = 2000;
/** What lies further out than this share of the distance goes into the outer classes. */
const TAIL = 0.0025;

type Distribution = ComparisonBody["distribution"];

/** Shares of the distance by value in classes that two logs have in common. */
export function shareValues(before: ChannelOnGround, after: ChannelOnGround): Distribution {
  const range = joinRange([rangeOf(before), rangeOf(after)]);
  if (!range) return { edges: [], before: [], after: [] };
  const fine = [before, after].map((from) => countFine(from, range));
  const [low, high] = bulk(fine, range);
  const step = niceStep((high - low) / CLASSES || 1);
  const first = Math.floor(low / step) * step;
  const classes = Math.max(1, Math.ceil((high - first) / step + 1e-9));
  const edges = Array.from({ length: classes + 1 }, (_, k) => Number((first + k * step).toPrecision(12)));
  const [a = [], b = []] = [before, after].map((from) => shareClasses(from, edges));
  return { edges, before: a, after: b };
}

type Range = [low: number, high: number];

function rangeOf(from: ChannelOnGround): Range | null {
  let [low, high] = [Infinity, -Infinity];
  for (const pass of from.placed.passes) {
    eachReading(from, pass, (value, weightM) => {
      if (!(weightM > 0)) return;
      low = Math.min(low, value);
      high = Math.max(high, value);
    });
  }
  return low <= high ? [low, high] : null;
}

function joinRange(ranges: (Range | null)[]): Range | null {
  const known = ranges.filter((range) => range !== null);
  if (known.length === 0) return null;
  return [Math.min(...known.map(([low]) => low)), Math.max(...known.map(([, high]) => high))];
}

function countFine(from: ChannelOnGround, [low, high]: Range): Float64Array {
  const counts = new Float64Array(FINE);
  const perUnit = high > low ? (FINE - 1) / (high - low) : 0;
  for (const pass of from.placed.passes) {
    eachReading(from, pass, (value, weightM) => (counts[Math.floor((value - low) * perUnit)]! += weightM));
  }
  return counts;
}

/** Where all but the tails of either log lie. */
function bulk(fine: Float64Array[], [low, high]: Range): Range {
  const valueOf = (bin: number) => low + (bin / (FINE - 1)) * (high - low);
  const ends = fine.flatMap((counts) => {
    const total = counts.reduce((sum, count) => sum + count, 0);
    return total > 0 ? [[reach(counts, TAIL * total), reach(counts, (1 - TAIL) * total) + 1] as const] : [];
  });
  return [valueOf(Math.min(...ends.map(([from]) => from))), valueOf(Math.max(...ends.map(([, to]) => to)))];
}

function reach(counts: Float64Array, target: number): number {
  let sum = 0;
  return Math.max(
    0,
    counts.findIndex((count) => (sum += count) >= target),
  );
}

function shareClasses(from: ChannelOnGround, edges: readonly number[]): number[] {
  const classes = edges.length - 1;
  const [first, second] = [edges[0]!, edges[1]!];
  const sums = new Array<number>(classes).fill(0);
  for (const pass of from.placed.passes) {
    eachReading(from, pass, (value, weightM) => {
      // The little more keeps a value that lies on an edge above it.
      const at = Math.floor((value - first) / (second - first) + 1e-6);
      sums[Math.min(classes - 1, Math.max(0, at))]! += weightM;
    });
  }
  const total = sums.reduce((sum, weight) => sum + weight, 0);
  return total > 0 ? sums.map((weight) => weight / total) : sums;
}
