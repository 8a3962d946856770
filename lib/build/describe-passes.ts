import { circularMean } from "@/lib/geo/circular-mean";
import type { Pass } from "@/lib/logs/placed-log";
import type { PassRange } from "@/lib/passes/segment-passes";

export interface DescribeInput {
  ranges: PassRange[];
  works: ArrayLike<number>;
  timeMs: ArrayLike<number>;
  headingDeg: Float32Array;
  eastM: ArrayLike<number>;
  northM: ArrayLike<number>;
}

/** Passes from their ranges, numbered from 1 in time order (in the file's order where times are missing). */
export function describePasses(input: DescribeInput): Pass[] {
  const started = (range: PassRange) => input.timeMs[range.first]!;
  const ordered = input.ranges
    .map((range, order) => ({ range, order }))
    .sort((a, b) => started(a.range) - started(b.range) || a.order - b.order);
  return ordered.map(({ range }, k) => describePass(input, range, k + 1));
}

function describePass(input: DescribeInput, range: PassRange, pass: number): Pass {
  const headings: number[] = [];
  let lengthM = 0;
  let last = -1;
  for (let i = range.first; i < range.end; i++) {
    if (input.works[i] !== 1) continue;
    headings.push(input.headingDeg[i]!);
    if (last >= 0) lengthM += Math.hypot(input.eastM[i]! - input.eastM[last]!, input.northM[i]! - input.northM[last]!);
    last = i;
  }
  return {
    pass,
    first: range.first,
    records: range.end - range.first,
    startedAtMs: input.timeMs[range.first]!,
    endedAtMs: input.timeMs[range.end - 1]!,
    headingDeg: circularMean(headings)?.meanDeg ?? NaN,
    lengthM,
    headland: false,
  };
}
