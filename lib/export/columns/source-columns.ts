import type { ReadingColumn } from "@/lib/export/columns/readings-table";
import { partFinder, type FilePart, type LogFileParts } from "@/lib/logs/file-parts";

/** Where a record came from: the line of the only file, or the file and its line. */
export function sourceColumns(fileParts: LogFileParts | undefined): ReadingColumn[] {
  if (!fileParts) return [lineColumn("Line (or feature) of the original file that the record came from.")];
  if (!fileParts.parts) {
    return [
      lineColumn(
        "Line (or feature) that the record came from, counted on from file to file: the file first in time has its own lines, " +
          "each later one its own line plus the sourceLine of the last record before it.",
      ),
    ];
  }
  const { parts } = fileParts;
  const line = lineColumn("Line (or feature) of the file named by sourceFile that the record came from.");
  return [
    fileColumn(parts),
    {
      ...line,
      prepare: ({ firstRecord, placed }) => {
        const find = partFinder(parts);
        return (record) => placed.log.sourceLine[record]! - (find(firstRecord + record)?.linesBefore ?? NaN);
      },
    },
  ];
}

function fileColumn(parts: readonly FilePart[]): ReadingColumn {
  return {
    name: "sourceFile",
    shortName: "FILE",
    kind: "integer",
    unit: "",
    meaning:
      "Number of the original file that the record came from, from 1 in the order of the list of original files.",
    prepare: ({ firstRecord }) => {
      const find = partFinder(parts);
      return (record) => {
        const part = find(firstRecord + record);
        return part ? part.file + 1 : NaN;
      };
    },
  };
}

function lineColumn(meaning: string): ReadingColumn {
  return {
    name: "sourceLine",
    shortName: "LINE",
    kind: "integer",
    unit: "",
    meaning,
    prepare:
      ({ placed }) =>
      (record) =>
        placed.log.sourceLine[record]!,
  };
}
