import { toolbarLayout, wingWords, type ToolbarLayout } from "@/lib/rows/toolbar-layout";
import type { RowStatisticsBody, RowStatisticsItem } from "@/lib/schemas/logs";
import { median } from "@/lib/statistics/median";

/** Rows that belong together on the machine, and what they did together, weighted by distance. */
export interface RowGroup {
  id: string;
  kind: "wing" | "section" | "track" | "rest";
  words: string;
  rows: number[];
  distanceM: number;
  mean: number | null;
  /** Median of the rows' medians. */
  p50: number | null;
  shareUnderTarget: number | null;
  shareAtLimit: number | null;
  shareContactLost: number | null;
}

/** Wings, sections and wheel tracks of a line-up; wings only where there are several. */
export function groupRows(
  { items, wheelTrackRows = [] }: Pick<RowStatisticsBody, "items" | "wheelTrackRows">,
  layout: ToolbarLayout = toolbarLayout(items.length, null),
): RowGroup[] {
  const of = (kind: RowGroup["kind"], words: string, rows: number[]) => describeGroup(items, { kind, words, rows });
  const wings = layout.wings.length > 1 ? layout.wings : [];
  const rest = items.map((item) => item.row).filter((row) => !wheelTrackRows.includes(row));
  return [
    ...wings.map((span, index) => of("wing", wingWords(index, wings.length), spanRows(span))),
    ...layout.sections.map((span, index) => of("section", `section ${index + 1}`, spanRows(span))),
    ...(wheelTrackRows.length > 0
      ? [of("track", "wheel tracks", [...wheelTrackRows]), of("rest", "beside wheel tracks", rest)]
      : []),
  ];
}

function spanRows({ first, last }: { first: number; last: number }): number[] {
  return Array.from({ length: last - first + 1 }, (_, index) => first + index);
}

function describeGroup(
  items: readonly RowStatisticsItem[],
  { kind, words, rows }: Pick<RowGroup, "kind" | "words" | "rows">,
): RowGroup {
  const members = items.filter((item) => rows.includes(item.row));
  const weighted = (field: "mean" | "shareUnderTarget" | "shareAtLimit" | "shareContactLost") => {
    const known = members.filter((item) => item[field] !== null && item.distanceM > 0);
    const metres = known.reduce((sum, item) => sum + item.distanceM, 0);
    return metres > 0 ? known.reduce((sum, item) => sum + item.distanceM * item[field]!, 0) / metres : null;
  };
  const middle = median(members.map((item) => item.p50 ?? NaN));
  return {
    id: `${kind} ${words}`,
    kind,
    words,
    rows,
    distanceM: members.reduce((sum, item) => sum + item.distanceM, 0),
    mean: weighted("mean"),
    p50: Number.isFinite(middle) ? middle : null,
    shareUnderTarget: weighted("shareUnderTarget"),
    shareAtLimit: weighted("shareAtLimit"),
    shareContactLost: weighted("shareContactLost"),
  };
}

/** "1 to 8", "5, 6, 19, 20". */
export function rowsInWords(rows: readonly number[]): string {
  const [first, last] = [rows[0], rows.at(-1)];
  if (first === undefined || last === undefined) return "";
  const isRun = rows.length > 2 && rows.every((row, index) => row === first + index);
  return isRun ? `${first} to ${last}` : rows.join(", ");
}
