import { formatNumber, formatQuantity } from "@/lib/units/format-quantity";

/** "1 203 readings", "1 reading", "no readings". */
export function readingWords(count: number): string {
  if (count === 0) return "no readings";
  return `${formatNumber(count, 0)} ${count === 1 ? "reading" : "readings"}`;
}

/** A share in per cent, fine enough that little is not shown as nothing: "0.04 %". */
export function shareWords(share: number): string {
  if (!Number.isFinite(share) || share === 0) return "0\u202f%";
  if (share < 0.0001) return "less than 0.01\u202f%";
  return formatQuantity(share, "fraction", "metric", { decimals: share < 0.001 ? 2 : 1 }).text;
}

/** What part of the readings in passes is left out. */
export function leftOutShare({ before, after }: { before: number; after: number }): number {
  return before > 0 ? (before - after) / before : 0;
}
