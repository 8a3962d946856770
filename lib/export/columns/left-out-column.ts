import { FLAGS, type FlagCode } from "@/lib/cleaning/flags";
import { CLEANING_CODES, ruleFacts, type CleaningCode } from "@/lib/cleaning/rule-catalogue";
import { leftOutNumbers } from "@/lib/cleaning/left-out";
import type { ReadingColumn } from "@/lib/export/columns/readings-table";
import type { PlacedLog } from "@/lib/logs/placed-log";

const LONGEST = Math.max(...CLEANING_CODES.map((code) => code.length));

/** Rules that are always on: what they name stands in no pass, and is flagged by the same code. */
const FIXED_CODES = CLEANING_CODES.filter(
  (code): code is CleaningCode & FlagCode => ruleFacts(code).fixed !== null && code in FLAGS,
);

const IN_NO_PASS =
  `Of a record in no pass (pass = 0) it names the rule that keeps it out of passes (${FIXED_CODES.join(", ")}) instead: its ` +
  "readings may stay in this file and count in no statistic. To count as the statistics do, take pass > 0. Empty: none.";

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
      `in the log. ${IN_NO_PASS}`,
    prepare: ({ placed }) => {
      const { rows } = placed.geometry;
      const numbers = leftOutNumbers(placed.leftOut ?? null, { records: placed.log.records, rows });
      return (record, row) => fixedRuleAt(placed, record) ?? codeOf(numbers[record * rows + row - 1]);
    },
  };
}

/** The same for a line that holds all rows: the first rule that takes out anything at the record. */
export function leftOutOfRecordColumn(): ReadingColumn {
  return {
    ...leftOutColumn(),
    meaning:
      "The first cleaning rule that takes out a reading of any row at this record; the readings it takes out are missing here, " +
      `and stay in the log. ${IN_NO_PASS}`,
    prepare: ({ placed }) => {
      const { rows } = placed.geometry;
      const numbers = leftOutNumbers(placed.leftOut ?? null, { records: placed.log.records, rows });
      return (record) => {
        const fixed = fixedRuleAt(placed, record);
        if (fixed) return fixed;
        const known = numbers.subarray(record * rows, (record + 1) * rows).filter((number) => number > 0);
        return known.length > 0 ? codeOf(Math.min(...known)) : null;
      };
    },
  };
}

/** The rule that keeps a record out of every pass; null in a pass, and where no rule but the shape of the work did. */
function fixedRuleAt({ passOf, flags }: Pick<PlacedLog, "passOf" | "flags">, record: number): CleaningCode | null {
  if (passOf[record]! > 0) return null;
  const bits = flags[record]!;
  return FIXED_CODES.find((code) => (bits & FLAGS[code]) !== 0) ?? null;
}

function codeOf(number: number | undefined): string | null {
  return number && number > 0 ? (CLEANING_CODES[number - 1] ?? null) : null;
}
