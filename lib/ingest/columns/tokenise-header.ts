import { ROW_WORDS_ELSEWHERE } from "@/lib/ingest/columns/other-languages";

/** Lower-case words of a header, without accents: split at marks, at capitals inside a word, and between letters and digits. */
export function tokeniseHeader(header: string): string[] {
  return header
    .normalize("NFD")
    .replace(/\p{Mn}/gu, "")
    .replace(/ß/g, "ss")
    .replace(/([a-z])([A-Z])/g, "$1 $2")
    .replace(/([A-Z]+)([A-Z][a-z])/g, "$1 $2")
    .replace(/([A-Za-z])(\d)/g, "$1 $2")
    .replace(/(\d)([A-Za-z])/g, "$1 $2")
    .toLowerCase()
    .split(/[^a-z0-9%]+/)
    .filter((token) => token !== "");
}

const ROW_WORDS = new Set(["row", "r", "rw", "unit", "ru", "opener", ...ROW_WORDS_ELSEWHERE]);

export interface RowInHeader {
  row: number;
  /** The header says "row" (or a like word) beside the number. */
  isNamed: boolean;
  rest: string[];
}

/** The row number a header names: `row 7`, `r7`, `[7]`, or a number of its own as in `DF_07`. Null without a number. */
export function readRowNumber(tokens: readonly string[]): RowInHeader | null {
  for (let i = 0; i < tokens.length; i++) {
    const next = tokens[i + 1] ?? "";
    if (ROW_WORDS.has(tokens[i] ?? "") && /^\d{1,4}$/.test(next)) {
      // "row unit 7" names the row with two words.
      const start = i > 0 && ROW_WORDS.has(tokens[i - 1] ?? "") ? i - 1 : i;
      return { row: Number(next), isNamed: true, rest: [...tokens.slice(0, start), ...tokens.slice(i + 2)] };
    }
  }
  const at = tokens.findLastIndex((token) => /^\d{1,4}$/.test(token));
  if (at < 0) return null;
  return { row: Number(tokens[at]), isNamed: false, rest: tokens.filter((_, index) => index !== at) };
}
