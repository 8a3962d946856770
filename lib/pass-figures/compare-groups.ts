import {
  differenceInterval,
  LEAST_PASSES,
  partInterval,
  partMeans,
  passesIn,
  resamplePasses,
  type PassSums,
} from "@/lib/pass-figures/resample-passes";
import type { PassComparison, PassGroup } from "@/lib/schemas/pass-figures";
import { finiteOrNull } from "@/lib/statistics/finite-or-null";

/** Fewer passes than this in a group say nothing about the group. */
const LEAST_IN_GROUP = 3;

/** Readings and speeds summed by pass and group; parts stand in the order of `keys`. */
export interface GroupSums {
  by: PassComparison["by"];
  keys: readonly string[];
  values: PassSums;
  speeds: PassSums;
  /** Rows of the channel: weights count each row's metres. */
  rows: number;
  /** Groups whose means are held against each other, as places in `keys`. */
  against: readonly [number, number];
  extras?: (part: number) => Partial<PassGroup>;
}

/** Means of the groups, and of two of them the difference, with intervals from passes drawn anew. */
export function compareGroups(given: GroupSums): PassComparison {
  const { by, keys, values, speeds, against } = given;
  const means = partMeans(values);
  const speedMeans = partMeans(speeds);
  const counts = keys.map((_, part) => passesIn(values, part));
  const reason = whyNoInterval(given, counts);
  const drawn = reason === null ? resamplePasses(values) : null;
  const [first, second] = against;
  const difference = means[first]! - means[second]!;
  return {
    by,
    groups: keys.flatMap((key, part) => {
      if (counts[part] === 0) return [];
      return {
        key,
        passes: counts[part]!,
        distanceM: weightOf(values, part) / given.rows,
        mean: finiteOrNull(means[part]!),
        interval: drawn && counts[part]! >= LEAST_IN_GROUP ? partInterval(drawn, part) : null,
        speedMps: finiteOrNull(speedMeans[part]!),
        ...given.extras?.(part),
      };
    }),
    difference: Number.isFinite(difference)
      ? {
          first: keys[first]!,
          second: keys[second]!,
          value: difference,
          interval: drawn ? differenceInterval(drawn, first, second) : null,
        }
      : null,
    reason,
  };
}

function weightOf({ passes, parts, weights }: PassSums, part: number): number {
  let sum = 0;
  for (let pass = 0; pass < passes; pass++) sum += weights[pass * parts + part]!;
  return sum;
}

const GROUP_WORDS: Record<string, string> = {
  along: "driven one way",
  against: "driven the other way",
  inside: "inside the field",
  headland: "on the headland",
  slow: "in the slowest third",
  fast: "in the fastest third",
  inner: "with inner rows of a turn",
  outer: "with outer rows of a turn",
};

function whyNoInterval({ values, keys, against }: GroupSums, counts: readonly number[]): string | null {
  const thin = against.find((part) => counts[part]! < LEAST_IN_GROUP);
  if (thin !== undefined) {
    const n = counts[thin]!;
    const words = GROUP_WORDS[keys[thin]!] ?? keys[thin];
    const passes = n === 0 ? "There is no pass" : `There ${n === 1 ? "is only 1 pass" : `are only ${n} passes`}`;
    return `${passes} ${words}: too few to compare.`;
  }
  if (values.passes >= LEAST_PASSES) return null;
  return `An interval needs ${LEAST_PASSES} passes; this log has ${values.passes}.`;
}
