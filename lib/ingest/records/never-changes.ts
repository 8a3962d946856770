import type { LogChannel } from "@/lib/logs/machine-log";

/** So few readings may agree by chance, or because the machine stood still. */
const FEWEST = 50;
/** What a machine may well hold still. */
const STEADY: ReadonlySet<string> = new Set(["swathWidth", "interval"]);

/** Whether a measured channel holds one and the same value throughout: a sensor that is stuck, or not there. */
export function neverChanges({ id, values, resolution }: LogChannel): boolean {
  if (resolution !== null || STEADY.has(id) || id.startsWith("other:")) return false;
  let filled = 0;
  let first = NaN;
  for (const value of values) {
    if (value !== value) continue;
    if (filled === 0) first = value;
    // The resolution is measured on a sample; here every reading counts.
    else if (value !== first) return false;
    filled++;
  }
  return filled >= FEWEST;
}
