import type { ExportColumn } from "@/lib/export/export-table";

const SHORT_LETTERS = 10;

/** Numbers the later ones of equal names (without regard to case, as SQL tables want it), long and short ones apart. */
export function makeNamesUnique<Column extends ExportColumn>(columns: readonly Column[]): Column[] {
  const longNames = new Set<string>();
  const shortNames = new Set<string>();
  return columns.map((column) => ({
    ...column,
    name: takeName(longNames, column.name, Infinity),
    shortName: takeName(shortNames, column.shortName, SHORT_LETTERS),
  }));
}

function takeName(taken: Set<string>, wanted: string, letters: number): string {
  let name = wanted.slice(0, letters);
  for (let number = 2; taken.has(name.toLowerCase()); number++) {
    const ending = `_${number}`;
    name = wanted.slice(0, letters - ending.length) + ending;
  }
  taken.add(name.toLowerCase());
  return name;
}
