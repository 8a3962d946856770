import { ruleNumber, type CleaningCode } from "@/lib/cleaning/rule-catalogue";
import type { RuleMask } from "@/lib/cleaning/rule-mask";
import type { ChannelId } from "@/lib/logs/channel";
import type { LogChannel } from "@/lib/logs/machine-log";

/**
 * What the rules that are on take out of a log. Every entry is the number of the first rule in order that does (1 for the
 * first of the catalogue), 0 where the reading is kept. A reading is out where any of the parts that hold for it is not 0;
 * its reason is the smallest of them.
 */
export interface LeftOut {
  /** Rows of `cells`. */
  rows: number;
  /** One entry a record; null where no rule takes out whole records. */
  records: Uint8Array | null;
  /** One entry a record and row, for per-row channels. */
  cells: Uint8Array | null;
  /** One entry a record, for channels of the whole machine. */
  whole: Uint8Array | null;
  /** Laid out like the channel. */
  channels: Map<ChannelId, Uint8Array>;
}

/** Puts masks together in the order they are given: a place keeps the number of the first rule. */
export function combineMasks(rows: number, masks: Iterable<{ code: CleaningCode; mask: RuleMask }>): LeftOut {
  const out: LeftOut = { rows, records: null, cells: null, whole: null, channels: new Map() };
  for (const { code, mask } of masks) {
    const number = ruleNumber(code);
    if (mask.records) out.records = addMask(out.records, mask.records, number);
    if (mask.cells) out.cells = addMask(out.cells, mask.cells, number);
    if (mask.whole) out.whole = addMask(out.whole, mask.whole, number);
    for (const [id, marks] of mask.channels ?? []) {
      out.channels.set(id, addMask(out.channels.get(id) ?? null, marks, number));
    }
  }
  return out;
}

function addMask(into: Uint8Array | null, marks: Uint8Array, number: number): Uint8Array {
  const sum = into ?? new Uint8Array(new SharedArrayBuffer(marks.length));
  for (let i = 0; i < marks.length; i++) if (marks[i] === 1 && sum[i] === 0) sum[i] = number;
  return sum;
}

/** The smaller number that is not 0. */
function firstOf(a: number, b: number): number {
  if (a === 0) return b;
  return b === 0 || a < b ? a : b;
}

/** Number of the first rule that takes out a reading of this channel; 0 where it is kept. `row` counts from 0. */
// kernel: one reading of one channel
export function reasonOf(
  out: LeftOut,
  channel: Pick<LogChannel, "id" | "rows" | "perRow">,
  record: number,
  row: number,
) {
  const ofRecord = out.records?.[record] ?? 0;
  const ofPlace = channel.perRow ? (out.cells?.[record * out.rows + row] ?? 0) : (out.whole?.[record] ?? 0);
  const own = out.channels.get(channel.id)?.[record * channel.rows + (channel.perRow ? row : 0)] ?? 0;
  return firstOf(firstOf(ofRecord, ofPlace), own);
}

/** The channel without the readings that are left out: a copy with NaN in their place, or itself where there are none. */
export function withoutLeftOut(channel: LogChannel, out: LeftOut): LogChannel {
  const place = channel.perRow && channel.rows === out.rows ? out.cells : channel.rows === 1 ? out.whole : null;
  const own = out.channels.get(channel.id) ?? null;
  const { rows } = channel;
  let values: Float32Array | null = null;
  const records = channel.values.length / rows;
  for (let record = 0, at = 0; record < records; record++) {
    const isOut = out.records !== null && out.records[record] !== 0;
    for (let row = 0; row < rows; row++, at++) {
      if (!isOut && !(place && place[at] !== 0) && !(own && own[at] !== 0)) continue;
      const value = channel.values[at]!;
      if (value !== value) continue;
      values ??= copyShared(channel.values);
      values[at] = NaN;
    }
  }
  return values ? { ...channel, values } : channel;
}

/** A copy in memory that threads share. */
export function copyShared(values: Float32Array): Float32Array {
  const copy = new Float32Array(new SharedArrayBuffer(values.byteLength));
  copy.set(values);
  return copy;
}

/**
 * The numbers as a channel of rows: of each record and row the first rule that takes out a reading of any channel there; NaN
 * where all are kept.
 */
export function leftOutNumbers(out: LeftOut | null, size: { records: number; rows: number }): Float32Array {
  const numbers = new Float32Array(size.records * size.rows).fill(NaN);
  if (!out) return numbers;
  for (const marks of [out.records, out.cells, out.whole, ...out.channels.values()]) {
    if (marks) addNumbers(numbers, marks, size.rows);
  }
  return numbers;
}

/** `marks` has one entry a reading, or one a record that holds for all its rows. */
// kernel: walks every reading
function addNumbers(numbers: Float32Array, marks: Uint8Array, rows: number): void {
  const places = marks.length === numbers.length ? 1 : rows;
  for (let at = 0; at < marks.length; at++) {
    const number = marks[at]!;
    if (number === 0) continue;
    for (let place = at * places; place < (at + 1) * places; place++) {
      if (!(numbers[place]! <= number)) numbers[place] = number;
    }
  }
}
