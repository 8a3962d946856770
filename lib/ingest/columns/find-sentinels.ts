import type { CellSummary } from "@/lib/ingest/columns/summarise-cells";

/** Numbers that loggers write for "nothing here": nines, and the ends of whole numbers of 8, 16 and 32 bits (common practice, no source). */
const CANDIDATES: ReadonlySet<number> = new Set([
  -99, -999, -9999, -99999, -999999, 9999, 99999, 999999, 9999999, 255, 32767, -32768, 65535, 2147483647, -2147483648,
  4294967295,
]);
/** One alone may be a reading. */
const FEWEST = 3;

/**
 * Takes out of a column's summary the numbers that seem to stand for "nothing here": known ones that come again and lie far
 * beyond the rest of the column. They are proposed, never dropped unasked.
 */
export function setAsideSentinels(summary: CellSummary): CellSummary & { missing: number[] } {
  const { ends } = summary;
  const missing: number[] = [];
  let [low, high] = [0, ends.length - 1];
  // The largest and smallest distinct numbers, from outside in, while they are sentinels.
  for (;;) {
    const rest = ends.slice(low, high + 1);
    const atLow = rest.length >= 2 && isSentinel(rest[0], rest[1], rest.at(-1));
    const atHigh = rest.length >= 2 && isSentinel(rest.at(-1), rest.at(-2), rest[0]);
    if (!atLow && !atHigh) break;
    const taken = atLow ? rest[0] : rest.at(-1);
    if (taken) missing.push(taken.value);
    if (atLow) low++;
    else high--;
  }
  if (missing.length === 0) return { ...summary, missing };
  return { ...summary, min: ends[low]?.value ?? null, max: ends[high]?.value ?? null, missing };
}

interface End {
  value: number;
  count: number;
}

/** Known, repeated, and further from its neighbour than the rest of the column is wide. */
function isSentinel(end: End | undefined, next: End | undefined, other: End | undefined): boolean {
  if (!end || !next || !other || !CANDIDATES.has(end.value) || end.count < FEWEST) return false;
  const gap = Math.abs(end.value - next.value);
  return gap > 2 * Math.abs(next.value - other.value) && gap > Math.abs(next.value);
}
