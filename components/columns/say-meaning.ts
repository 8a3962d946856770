import { readMissing, type ColumnChoice, type FoundColumn } from "@/components/columns/column-choice";
import { channelWords } from "@/lib/ingest/channel-quantities";
import { describeColumn, type ColumnMeaning } from "@/lib/ingest/columns/describe-column";
import type { UnitId } from "@/lib/units/unit-table";

/** The unit as written after a number. */
export function unitSign(unit: UnitId): string {
  if (unit === "percent") return "%";
  if (unit === "deg") return "°";
  return unit === "1" ? "" : unit;
}

/** What the choice comes to as an entry of a mapping; null for "left out". */
export function meaningOf(choice: ColumnChoice): ColumnMeaning | null {
  if (choice.use !== "channel" || choice.channel === null) return null;
  const format = choice.format.trim();
  const missing = readMissing(choice.missing) ?? [];
  return {
    channel: choice.channel,
    unit: choice.unit,
    ...(choice.row === null ? {} : { row: choice.row }),
    ...(format === "" ? {} : { format }),
    ...(missing.length === 0 ? {} : { missing }),
  };
}

/** One column in words; said anew at every change. */
export function sayColumn(column: FoundColumn, choice: ColumnChoice): string {
  if (choice.use === "undecided") return `Column '${column.name}' was not recognised: leave it out, or say what it is.`;
  return describeColumn(column, meaningOf(choice));
}

function rowRange(rows: (number | null)[]): string {
  const known = rows.filter((row): row is number => row !== null);
  if (known.length !== rows.length) return "";
  const isRun = known.every((row, index) => index === 0 || row === (known[index - 1] ?? NaN) + 1);
  return isRun ? ` of rows ${known[0]} to ${known.at(-1)}` : ` of rows ${known.join(", ")}`;
}

function sameMeaning(choices: ColumnChoice[]): ColumnChoice | null {
  const [first] = choices;
  const alike = choices.every(
    (choice) => choice.use === first?.use && choice.channel === first.channel && choice.unit === first.unit,
  );
  return first && alike ? first : null;
}

/**
 * Several columns that mean the same row by row, as one sentence: "Columns 'DF_01_lbf' … 'DF_24_lbf' are the downforce
 * of rows 1 to 24 in pounds-force; 212 lbf here is 943 N." Null when they no longer do and must be read one by one.
 */
export function sayGroup(columns: FoundColumn[], choices: ColumnChoice[]): string | null {
  const first = sameMeaning(choices);
  const spoken = columns.find((column) => column.sample.some((text) => Number(text) !== 0)) ?? columns[0];
  if (!first || !spoken) return null;
  const names = `Columns '${columns[0]?.name ?? ""}' … '${columns.at(-1)?.name ?? ""}'`;
  if (first.use === "undecided") return `${names} were not recognised: leave them out, or say what they are.`;
  const meaning = meaningOf({ ...first, row: null });
  if (!meaning) return `${names} are not used.`;
  const rows = rowRange(choices.map((choice) => choice.row));
  const thing = `the ${channelWords(meaning.channel)}`;
  const rest = describeColumn(spoken, meaning).slice(`Column '${spoken.name}' `.length);
  return `${names} ${rest
    .replace(/^is /, "are ")
    .replace(/^looks /, "look ")
    .replace(thing, () => thing + rows)}`;
}
