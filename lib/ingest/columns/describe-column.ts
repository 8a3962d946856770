import { channelWords } from "@/lib/ingest/channel-quantities";
import type { ColumnProposal, FoundColumn } from "@/lib/ingest/log-format";
import type { MappedColumn } from "@/lib/ingest/mapping";
import { readBushelWeight } from "@/lib/ingest/records/bushel-weight";
import { parseDegrees, readDegreesForm, type DegreesForm } from "@/lib/ingest/records/parse-degrees";
import { parseNumber } from "@/lib/ingest/records/parse-number";
import { unitFactor } from "@/lib/units/convert-unit";
import { getUnit, type UnitId } from "@/lib/units/unit-table";

/** What a column is taken to mean: an entry of a mapping, or a proposal whose unit may still be open. */
export type ColumnMeaning = Pick<MappedColumn, "channel" | "row" | "format" | "missing"> & { unit: UnitId | null };

/**
 * A column's meaning as one sentence for a person:
 * "Column 'DF_07_lbf' is the downforce of row 7 in pounds-force; 212 lbf here is 943 N."
 * Say it again after an edit with the edited mapping entry; null says that the column is not used.
 */
export function describeColumn(
  column: Pick<FoundColumn, "name" | "sample">,
  meaning: ColumnMeaning | null,
  options: { decimalComma?: boolean } = {},
): string {
  const name = `Column '${column.name}'`;
  if (!meaning) return `${name} is not used.`;
  const row = meaning.row === undefined ? "" : ` of row ${meaning.row}`;
  const what = `the ${channelWords(meaning.channel)}${row}`;
  if (meaning.unit === null) return `${name} looks like ${what}, but nothing says in which unit: choose one.`;
  const unit = getUnit(meaning.unit);
  if (unit.quantity === "switch") return `${name} is ${what}: on or off${quote(column.sample[0])}.`;
  if (unit.quantity === "number") return `${name} is ${what}${countWords(meaning)}${quote(column.sample[0])}.`;
  if (unit.quantity === "clock")
    return `${name} is ${what} as ${unit.words}${patternWords(meaning)}${quote(column.sample[0])}.`;
  const lost = meaning.channel === "contact" && meaning.format === "lost" ? ", counted where it was lost" : "";
  const isFromStart = meaning.channel === "time" ? " from the start of the log" : "";
  const aside = unit.quantity === "pressure" && isForceChannel(meaning) ? " (a pressure, never shown as a force)" : "";
  return `${name} is ${what} in ${unit.words}${lost}${isFromStart}${aside}${exampleWords(column, { ...meaning, unit: meaning.unit }, options)}${missingWords(meaning)}.`;
}

function missingWords({ missing }: ColumnMeaning): string {
  return missing?.length ? `; ${missing.join(" and ")} ${missing.length === 1 ? "counts" : "count"} as missing` : "";
}

function isForceChannel({ channel }: ColumnMeaning): boolean {
  return channel === "downforce" || channel === "margin";
}

function quote(sample: string | undefined): string {
  return sample === undefined || sample.trim() === "" ? "" : `, for example "${sample.trim()}"`;
}

function countWords(meaning: ColumnMeaning): string {
  return meaning.channel === "row" && meaning.format === "from 0" ? ", counted from 0 in the file and from 1 here" : "";
}

function patternWords(meaning: ColumnMeaning): string {
  return meaning.format === undefined ? "" : ` written ${meaning.format}`;
}

function exampleWords(
  column: Pick<FoundColumn, "sample">,
  { unit, format }: ColumnMeaning & { unit: UnitId },
  options: { decimalComma?: boolean },
): string {
  const form = getUnit(unit).quantity === "angle" && format !== undefined ? readDegreesForm(format) : null;
  if (form) return degreesExample(column, form, format ?? "");
  const poundsPerBushel = unit === "bu/ac" ? readBushelWeight(format) : undefined;
  if (poundsPerBushel === null) return "; give the weight of a bushel, such as 56 lb";
  const value = column.sample
    .map((text) => parseNumber(text, options.decimalComma))
    .find((number) => !Number.isNaN(number));
  if (value === undefined) return "";
  const { si } = getUnit(unit);
  const shown = `${value} ${symbol(unit)}`;
  if (si === unit || (unit === "fraction" && si === "fraction")) return `, for example ${shown}`;
  const valueSi = value * unitFactor(unit, { poundsPerBushel });
  return `; ${shown} here is ${roundForReading(valueSi)} ${si === "fraction" ? "of one" : si}`;
}

function degreesExample({ sample }: Pick<FoundColumn, "sample">, form: DegreesForm, format: string): string {
  const text = sample[0]?.trim() ?? "";
  const degrees = parseDegrees(text, form);
  const shown = Number.isNaN(degrees) ? "cannot be read so" : `here is ${Number(degrees.toFixed(6))} degrees`;
  return ` written ${format}${text === "" ? "" : `; "${text}" ${shown}`}`;
}

function symbol(unit: UnitId): string {
  if (unit === "percent") return "%";
  return unit === "fraction" ? "of one" : unit;
}

/** Three figures, more where the whole part has more: 943, 0.0508, 1112. */
function roundForReading(value: number): string {
  const size = Math.abs(value);
  return size >= 100 ? String(Math.round(value)) : String(Number(value.toPrecision(3)));
}

/** The sentence of a proposal, with what it rests on where it is unsure. */
export function describeProposal(
  column: Pick<FoundColumn, "name" | "sample">,
  proposal: ColumnProposal | null,
  options: { decimalComma?: boolean } = {},
): string {
  if (!proposal) return `Column '${column.name}' was not recognised: leave it out, or say what it is.`;
  const sentence = describeColumn(column, proposal, options);
  return proposal.confidence >= 0.7 ? sentence : `${sentence} Please check: ${proposal.reason}.`;
}
