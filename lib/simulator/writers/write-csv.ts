import type { MachineLog } from "@/lib/logs/machine-log";
import { FILE_STYLE_DEFAULTS, type FileStyle } from "@/lib/simulator/writers/file-style";
import {
  describeWrittenChannel,
  type LogColumn,
  placingColumns,
  rowColumn,
  wideColumns,
} from "@/lib/simulator/writers/log-columns";

/** Records joined into one string before it is handed on: large enough to be quick, small enough to stream. */
const RECORDS_A_CHUNK = 256;

/** One line a record, the rows side by side; yields the file piece by piece, names first. */
export function* writeWideCsvChunks(log: MachineLog, input: Partial<FileStyle> = {}): Generator<string> {
  const style = { ...FILE_STYLE_DEFAULTS, ...input };
  const columns = wideColumns(log, style);
  yield head(columns, style);
  for (let from = 0; from < log.records; from += RECORDS_A_CHUNK) {
    const to = Math.min(log.records, from + RECORDS_A_CHUNK);
    let text = "";
    for (let record = from; record < to; record += 1) text += line(columns, record, style);
    yield text;
  }
}

export function writeWideCsv(log: MachineLog, style: Partial<FileStyle> = {}): string {
  return [...writeWideCsvChunks(log, style)].join("");
}

/** One line a record and row, with a row column. */
export function* writeLongCsvChunks(log: MachineLog, input: Partial<FileStyle> = {}): Generator<string> {
  const style = { ...FILE_STYLE_DEFAULTS, ...input };
  const placing = placingColumns(log, style);
  const written = log.channels.filter((channel) => channel.perRow).map((one) => describeWrittenChannel(one, style));
  const rowName = style.naming === "plain" ? "Row" : "ROW";
  const perRow = Array.from({ length: log.rows }, (_, index): LogColumn[] => [
    { name: rowName, decimals: 0, at: () => index + 1 },
    ...written.map((one) => ({ ...rowColumn(one, index + 1), name: one.nameOf(null) })),
  ]);
  yield head([...placing, ...(perRow[0] ?? [])], style);
  for (let record = 0; record < log.records; record += 1) {
    yield perRow.map((columns) => line([...placing, ...columns], record, style)).join("");
  }
}

export function writeLongCsv(log: MachineLog, style: Partial<FileStyle> = {}): string {
  return [...writeLongCsvChunks(log, style)].join("");
}

function head(columns: readonly LogColumn[], style: FileStyle): string {
  const mark = style.byteOrderMark ? "\uFEFF" : "";
  return mark + columns.map((column) => column.name).join(style.delimiter) + style.newline;
}

function line(columns: readonly LogColumn[], record: number, style: FileStyle): string {
  let text = "";
  for (let index = 0; index < columns.length; index += 1) {
    const column = columns[index];
    if (!column) continue;
    if (index > 0) text += style.delimiter;
    text += cell(column, record, style);
  }
  return text + style.newline;
}

function cell(column: LogColumn, record: number, style: FileStyle): string {
  const value = column.at(record);
  if (value === null) return "";
  if (typeof value === "string") return value;
  const text = value.toFixed(column.decimals);
  return style.decimalComma ? text.replace(".", ",") : text;
}
