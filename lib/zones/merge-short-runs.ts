import type { ClassRun } from "@/lib/zones/runs";

interface MergeOptions {
  minLengthM: number;
  /** Whether classes are names, of which none is nearer than another. */
  isNamed?: boolean;
}

/**
 * Gives runs shorter than `minLengthM`, shortest first, to the neighbour that touches them: the one of the nearer class, the
 * longer of two alike, or where classes are names. A short run without a neighbour stays, so that no ground is lost.
 */
export function mergeShortRuns(runs: ClassRun[], { minLengthM, isNamed = false }: MergeOptions): ClassRun[] {
  const merged = runs.map((run) => ({ ...run }));
  for (;;) {
    const shortest = pickShortest(merged, minLengthM);
    if (shortest < 0) return merged;
    const run = merged[shortest]!;
    const into = chooseNeighbour(merged, shortest, isNamed)!;
    into.first = Math.min(into.first, run.first);
    into.last = Math.max(into.last, run.last);
    into.lengthM += run.lengthM;
    merged.splice(shortest, 1);
    joinAlike(merged, merged.indexOf(into));
  }
}

function pickShortest(runs: ClassRun[], minLengthM: number): number {
  let shortest = -1;
  runs.forEach((run, k) => {
    const shorter = run.lengthM < (runs[shortest]?.lengthM ?? minLengthM);
    if (shorter && chooseNeighbour(runs, k) !== null) shortest = k;
  });
  return shortest;
}

function chooseNeighbour(runs: ClassRun[], k: number, isNamed = false): ClassRun | null {
  const run = runs[k]!;
  const before = runs[k - 1];
  const after = runs[k + 1];
  const left = before && before.last === run.first - 1 ? before : null;
  const right = after && after.first === run.last + 1 ? after : null;
  if (!left || !right) return left ?? right;
  const nearer = isNamed ? 0 : Math.abs(left.class - run.class) - Math.abs(right.class - run.class);
  if (nearer !== 0) return nearer < 0 ? left : right;
  return left.lengthM >= right.lengthM ? left : right;
}

/** Joins run `k` with touching neighbours of its own class. */
function joinAlike(runs: ClassRun[], k: number): void {
  for (const other of [k + 1, k]) {
    const [first, second] = [runs[other - 1], runs[other]];
    if (!first || !second || first.class !== second.class || first.last !== second.first - 1) continue;
    first.last = second.last;
    first.lengthM += second.lengthM;
    runs.splice(other, 1);
  }
}
