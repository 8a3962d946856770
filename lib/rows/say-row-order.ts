import type { MirroredRows } from "@/lib/rows/find-mirrored-rows";

/** Why nobody could check from the ground that row 1 is the leftmost: one quiet sentence. */
export function sayUncheckedRowOrder({ evidence, reason }: Pick<MirroredRows, "evidence" | "reason">): string {
  const why =
    evidence.runs === 0
      ? "no rows switch off at angled edges."
      : `${reason.slice(0, 1).toLowerCase()}${reason.slice(1)}`;
  return `Row order (row 1 left) could not be checked: ${why}`;
}
