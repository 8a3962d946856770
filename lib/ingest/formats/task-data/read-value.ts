import { PLAIN, type ValueColumn } from "@/lib/ingest/formats/task-data/plan-columns";

/** kernel: what a column holds of a raw value; NaN for nothing. Of two bits, 0 is off and 1 on; 2 (error) and 3 (not there) are nothing. */
export function readValue({ factor, offset, shift }: ValueColumn, raw: number): number {
  if (shift === PLAIN) return raw * factor + offset;
  if (raw !== raw) return NaN;
  const state = shift < 0 ? raw : (raw >>> shift) & 3;
  return state === 0 || state === 1 ? state : NaN;
}
