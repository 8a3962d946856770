import type { ColumnEvidence } from "@/lib/ingest/columns/guess-columns";
import { readHeaderUnit, readUnitWord } from "@/lib/ingest/columns/read-unit-words";
import { readRowNumber, tokeniseHeader } from "@/lib/ingest/columns/tokenise-header";
import type { ColumnHint, ColumnProposal } from "@/lib/ingest/log-format";
import { isUnitId } from "@/lib/units/unit-table";

/**
 * What the header of a column of unknown meaning says all the same: its unit, and its row where several columns differ in
 * nothing but that number. Null where the column has a meaning or says nothing.
 */
export function hintColumns(
  columns: readonly ColumnEvidence[],
  proposals: readonly (ColumnProposal | null)[],
): (ColumnHint | null)[] {
  const hasRowColumn = proposals.some((proposal) => proposal?.channel === "row");
  const rows = hasRowColumn ? new Map<number, number>() : readRows(columns, proposals);
  return columns.map((column, index) => {
    if (proposals[index]) return null;
    const unit = readUnit(column);
    const row = rows.get(index);
    if (unit === null && row === undefined) return null;
    return { ...(unit === null ? {} : { unit }), ...(row === undefined ? {} : { row }) };
  });
}

/** A pound is a force or a mass by what it measures, and that is not known here. */
function readUnit({ name, unitCell }: ColumnEvidence): ColumnHint["unit"] | null {
  const word = (unitCell === null ? null : readUnitWord(unitCell)) ?? readHeaderUnit(name)?.unit ?? null;
  return word !== null && isUnitId(word) && word !== "1" ? word : null;
}

/** Rows by the column's index, of columns whose names are alike but for the number. Rows from 0 are counted from 1. */
function readRows(
  columns: readonly ColumnEvidence[],
  proposals: readonly (ColumnProposal | null)[],
): Map<number, number> {
  const alike = new Map<string, { index: number; row: number }[]>();
  columns.forEach(({ name }, index) => {
    const found = proposals[index] ? null : readRowNumber(tokeniseHeader(readHeaderUnit(name)?.rest ?? name));
    if (!found) return;
    const key = found.rest.join(" ");
    alike.set(key, [...(alike.get(key) ?? []), { index, row: found.row }]);
  });
  const rows = new Map<number, number>();
  for (const group of alike.values()) {
    const numbers = group.map(({ row }) => row);
    if (group.length < 2 || new Set(numbers).size < group.length || Math.max(...numbers) > 1024) continue;
    const first = Math.min(...numbers) === 0 ? 1 : 0;
    for (const { index, row } of group) rows.set(index, row + first);
  }
  return rows;
}
