import { CLEANING_CODES } from "@/lib/cleaning/rule-catalogue";
import { leftOutNumbers } from "@/lib/cleaning/left-out";
import type { ReadingColumn } from "@/lib/export/columns/readings-table";

const LONGEST = Math.max(...CLEANING_CODES.map((code) => code.length));

/** Why readings of the row at the record are missing though they were logged; for logs with cleaning rules. */
export function leftOutColumn(): ReadingColumn {
  return {
    name: "leftOut",
    shortName: "LEFT_OUT",
    kind: "text",
    unit: "",
    width: LONGEST,
    meaning:
      "The first cleaning rule that takes out a reading of this row at this record; the reading is then missing here, and stays " +
      "in the log. Empty: none.",
    prepare: ({ placed }) => {
      const { rows } = placed.geometry;
      const numbers = leftOutNumbers(placed.leftOut ?? null, { records: placed.log.records, rows });
      return (record, row) => codeOf(numbers[record * rows + row - 1]);
    },
  };
}

/** The same for a line that holds all rows: the first rule that takes out anything at the record. */
export function leftOutOfRecordColumn(): ReadingColumn {
  return {
    ...leftOutColumn(),
    meaning:
      "The first cleaning rule that takes out a reading of any row at this record; the readings it takes out are missing here, " +
      "and stay in the log. Empty: none.",
    prepare: ({ placed }) => {
      const { rows } = placed.geometry;
      const numbers = leftOutNumbers(placed.leftOut ?? null, { records: placed.log.records, rows });
      return (record) => {
        const known = numbers.subarray(record * rows, (record + 1) * rows).filter((number) => number > 0);
        return known.length > 0 ? codeOf(Math.min(...known)) : null;
      };
    },
  };
}

function codeOf(number: number | undefined): string | null {
  return number && number > 0 ? (CLEANING_CODES[number - 1] ?? null) : null;
}
