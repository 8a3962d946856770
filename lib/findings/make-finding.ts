import type { Finding } from "@/lib/findings/finding";
import { sayTemplate } from "@/lib/findings/say-finding";

type Spoken = Pick<Finding, "kind" | "severity" | "sentenceTemplate" | "method" | "check">;
type Optional = Partial<
  Omit<Finding, "id" | "sentence" | "kind" | "severity" | "sentenceTemplate" | "method" | "check">
>;

/** Completes a finding: its identity from kind and row, its sentence from the template in SI units, null where nothing was said. */
export function makeFinding(given: Spoken & Optional): Finding {
  const rows = given.rows ?? (given.row ? [given.row] : []);
  const values = given.values ?? {};
  return {
    value: null,
    unit: "1",
    interval: null,
    confidence: "high",
    place: null,
    caution: null,
    row: null,
    ...given,
    id: findingId(given.kind, given.row ?? null, rows),
    rows,
    values,
    sentence: sayTemplate(given.sentenceTemplate, values, "metric"),
  };
}

/** "row 3", "rows 3 and 4", "rows 3, 4 and 9"; long runs shortened to "3 to 9". */
export function sayRows(rows: readonly number[]): string {
  const parts: string[] = [];
  for (let k = 0; k < rows.length;) {
    let end = k;
    while (end + 1 < rows.length && rows[end + 1] === rows[end]! + 1) end++;
    if (end - k >= 2) parts.push(`${rows[k]} to ${rows[end]}`);
    else for (let each = k; each <= end; each++) parts.push(String(rows[each]));
    k = end + 1;
  }
  const last = parts.pop() ?? "";
  const list = parts.length > 0 ? `${parts.join(", ")} and ${last}` : last;
  return `${rows.length === 1 ? "row" : "rows"} ${list}`;
}

export function startSentence(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** Stable for the same log: kind, and the row or rows it speaks of where there may be several of a kind. */
function findingId(kind: Finding["kind"], row: number | null, rows: readonly number[]): string {
  if (row !== null) return `${kind}-row-${row}`;
  const several = kind === "rows-side-by-side";
  return several ? `${kind}-${rows[0]}-${rows[rows.length - 1]}` : kind;
}
