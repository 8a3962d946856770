import type { FoundColumn } from "@/components/columns/column-choice";

/** Columns shown as one line: the same thing row by row; or one column alone. */
export interface ColumnGroup {
  key: string;
  columns: FoundColumn[];
}

/** The name with its numbers blanked, so that `DF_01_lbf` and `DF_24_lbf` read alike. */
function namePattern(name: string): string {
  return name.replace(/\d+/g, "#");
}

function groupKey(column: FoundColumn): string {
  const { proposal } = column;
  if (proposal && proposal.row === undefined) return `one:${column.name}`;
  if (!proposal && !/\d/.test(column.name)) return `one:${column.name}`;
  return `rows:${proposal?.channel ?? ""}:${proposal?.unit ?? ""}:${namePattern(column.name)}`;
}

/** Groups in the order of the file. They rest on the proposals only, so a group does not fall apart while it is edited. */
export function groupColumns(columns: FoundColumn[]): ColumnGroup[] {
  const groups = new Map<string, ColumnGroup>();
  for (const column of columns) {
    const key = groupKey(column);
    const group = groups.get(key);
    if (group) group.columns.push(column);
    else groups.set(key, { key, columns: [column] });
  }
  return [...groups.values()];
}
