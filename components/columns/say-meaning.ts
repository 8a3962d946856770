import type { ColumnChoice, FoundColumn } from "@/components/columns/column-choice";
import { writeNumber } from "@/components/units/show-quantity";
import { channelWords } from "@/lib/ingest/channel-quantities";
import { toSi } from "@/lib/units/convert-unit";
import { getUnit, type UnitId } from "@/lib/units/unit-table";

export interface Saying {
  /** "Column DF_07_lbf", "Columns DF_01_lbf … DF_24_lbf". */
  subject: string;
  /** "is the downforce of row 7 in pounds-force". */
  meaning: string;
  /** "212 lbf here is 943 N"; null where there is nothing to convert. */
  example: string | null;
}

const SAME_IN_SI = new Set(["1", "boolean", "fraction", "deg"]);

/** The first sample that is a plain number. */
function sampleNumber(column: FoundColumn): number | null {
  for (const text of column.sample) {
    const value = Number(text.trim().replace(",", "."));
    if (text.trim() !== "" && Number.isFinite(value) && value !== 0) return value;
  }
  return null;
}

function bushelPounds(format: string): number | undefined {
  const pounds = Number.parseFloat(format);
  return Number.isFinite(pounds) ? pounds : undefined;
}

function example(column: FoundColumn, unit: UnitId, format: string): string | null {
  const { si, quantity } = getUnit(unit);
  const value = sampleNumber(column);
  if (value === null || quantity === "clock" || SAME_IN_SI.has(unit) || unit === si) return null;
  const poundsPerBushel = bushelPounds(format);
  if (unit === "bu/ac" && !poundsPerBushel) return null;
  const converted = si === "fraction" ? toSi(value, unit) : toSi(value, unit, { poundsPerBushel });
  return `${writeNumber(value)}\u2009${unitSign(unit)} here is ${writeNumber(converted)}${si === "fraction" ? "" : `\u2009${si}`}`;
}

/** The unit as written after a number. */
export function unitSign(unit: UnitId): string {
  if (unit === "percent") return "%";
  if (unit === "deg") return "°";
  return unit === "1" ? "" : unit;
}

function inUnit(unit: UnitId | null): string {
  if (unit === null) return ", in a unit the file does not name";
  if (unit === "1") return "";
  if (unit === "boolean") return " (on or off)";
  if (unit === "1/m2" || unit === "1/ac" || unit === "1/ha") return ` ${getUnit(unit).words}`;
  return unit === "fraction" ? " as a fraction of one" : ` in ${getUnit(unit).words}`;
}

function meaningOf(choice: ColumnChoice, plural: boolean, rowWords: string): string {
  const verb = plural ? "are" : "is";
  if (choice.use === "out") return `${verb} left out`;
  if (choice.use === "undecided" || choice.channel === null)
    return `${verb} not understood: say what ${plural ? "they mean" : "it means"}, or leave ${plural ? "them" : "it"} out`;
  return `${verb} the ${channelWords(choice.channel)}${rowWords}${inUnit(choice.unit)}`;
}

/** One column in words. */
export function sayColumn(column: FoundColumn, choice: ColumnChoice): Saying {
  const rowWords = choice.row === null ? "" : ` of row ${choice.row}`;
  return {
    subject: `Column ${column.name}`,
    meaning: meaningOf(choice, false, rowWords),
    example: choice.use === "channel" && choice.unit ? example(column, choice.unit, choice.format) : null,
  };
}

function rowRange(rows: (number | null)[]): string {
  const known = rows.filter((row): row is number => row !== null);
  if (known.length !== rows.length) return "";
  const isRun = known.every((row, index) => index === 0 || row === (known[index - 1] ?? NaN) + 1);
  return isRun ? ` of rows ${known[0]} to ${known.at(-1)}` : ` of rows ${known.join(", ")}`;
}

/** Several columns that mean the same row by row; null when they no longer do and must be read one by one. */
export function sayGroup(columns: FoundColumn[], choices: ColumnChoice[]): Saying | null {
  const [first] = choices;
  const [firstColumn] = columns;
  if (!first || !firstColumn) return null;
  const alike = choices.every(
    (choice) => choice.use === first.use && choice.channel === first.channel && choice.unit === first.unit,
  );
  if (!alike) return null;
  const withNumber = columns.find((column) => sampleNumber(column) !== null) ?? firstColumn;
  return {
    subject: `Columns ${firstColumn.name} … ${columns.at(-1)?.name ?? ""}`,
    meaning: meaningOf(first, true, rowRange(choices.map((choice) => choice.row))),
    example: first.use === "channel" && first.unit ? example(withNumber, first.unit, first.format) : null,
  };
}
