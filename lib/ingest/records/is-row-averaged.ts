import type { LogChannel } from "@/lib/logs/machine-log";

/** Records looked at; real row units differ within a few. */
const SAMPLE = 500;
/** So few records may agree by chance, or because the machine stood still. */
const FEWEST = 20;

/** Whether all rows of a per-row channel hold the same value in every record (of up to 500, spread evenly) that has two or more. */
export function isRowAveraged({ perRow, rows, values, resolution }: LogChannel): boolean {
  if (!perRow || rows < 2 || resolution === null) return false;
  const records = values.length / rows;
  const stride = Math.max(1, Math.floor(records / SAMPLE));
  let compared = 0;
  for (let record = 0; record < records; record += stride) {
    const cells = [...values.subarray(record * rows, (record + 1) * rows)].filter((value) => !Number.isNaN(value));
    if (cells.length < 2) continue;
    if (cells.some((value) => value !== cells[0])) return false;
    compared++;
  }
  return compared >= FEWEST;
}
