import { isMissing, parseNumber } from "@/lib/ingest/records/parse-number";
import { parseBoolean } from "@/lib/ingest/records/parse-boolean";

/** What the sampled cells of a column hold. */
export interface CellSummary {
  /** Up to five raw texts, the first that are not blank. */
  sample: string[];
  filled: number;
  /** Shares of the filled cells. */
  numericShare: number;
  switchShare: number;
  wholeShare: number;
  min: number | null;
  max: number | null;
  median: number | null;
  /** The smallest and largest distinct numbers with their counts, in order: at most six from each end. */
  ends: { value: number; count: number }[];
}

const ENDS = 6;

function countEnds(sorted: readonly number[]): CellSummary["ends"] {
  const counted: CellSummary["ends"] = [];
  for (const value of sorted) {
    const last = counted.at(-1);
    if (last?.value === value) last.count++;
    else counted.push({ value, count: 1 });
  }
  return counted.length <= 2 * ENDS ? counted : [...counted.slice(0, ENDS), ...counted.slice(-ENDS)];
}

export function summariseCells(cells: readonly string[], decimalComma: boolean): CellSummary {
  const filled = cells.filter((cell) => !isMissing(cell));
  const numbers = filled.map((cell) => parseNumber(cell, decimalComma)).filter((value) => !Number.isNaN(value));
  const sorted = [...numbers].sort((a, b) => a - b);
  const share = (count: number) => (filled.length === 0 ? 0 : count / filled.length);
  return {
    sample: (filled.length > 0 ? filled : cells).slice(0, 5).map((cell) => cell.slice(0, 200)),
    filled: filled.length,
    numericShare: share(numbers.length),
    switchShare: share(filled.filter(isSwitch).length),
    wholeShare: share(numbers.filter(Number.isInteger).length),
    min: sorted[0] ?? null,
    max: sorted.at(-1) ?? null,
    median: sorted[Math.floor(sorted.length / 2)] ?? null,
    ends: countEnds(sorted),
  };
}

function isSwitch(cell: string): boolean {
  const text = cell.trim().toLowerCase();
  return /^[01]$/.test(text) || (!/\d/.test(text) && !Number.isNaN(parseBoolean(text)));
}
