import {
  CLEANING_CODES,
  ruleFacts,
  ruleNumber,
  type CleaningCode,
  type CleaningRules,
} from "@/lib/cleaning/rule-catalogue";
import type { RuleMask } from "@/lib/cleaning/rule-mask";
import type { LogChannel } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { CleaningItem, RuleParameter } from "@/lib/schemas/cleaning";

export interface CleaningCounts {
  items: CleaningItem[];
  total: { logged: number; before: number; after: number };
}

/** What is left while the rules have their turn: a reading once taken out is not taken out again. */
interface Remaining {
  channels: readonly LogChannel[];
  /** Row-major as the channel; 1 where a rule for single readings took it out. */
  taken: Uint8Array[];
  /** 1 where a rule took out the whole record. */
  gone: Uint8Array;
  /** Readings of each record: all that were logged, and those still left. */
  logged: Int32Array;
  left: Int32Array;
}

/**
 * Counts what each rule takes out or, where it is off, would: by itself (`readings`), and of what the rules before it that
 * are on had left (`takenOutFirst`). `maskOf` gives the mask of a rule of the log with its channels moved.
 */
export function countRules(
  placed: PlacedLog,
  rules: CleaningRules,
  maskOf: (code: CleaningCode) => RuleMask,
): CleaningCounts {
  const remaining = countReadings(placed);
  const logged = sum(remaining.logged);
  const before = remaining.logged.reduce((n, readings, i) => (placed.passOf[i] === 0 ? n : n + readings), 0);
  let left = logged;
  const items = CLEANING_CODES.map((code): CleaningItem => {
    const { level, label, words, fixed } = ruleFacts(code);
    const { on } = rules[code];
    const counted = countRule(placed, remaining, { code, mask: maskOf(code), on });
    const all = fixed === null ? before : logged;
    const item = {
      code,
      number: ruleNumber(code),
      label,
      words,
      on,
      fixed,
      parameters: parametersOf(code, rules),
      level,
      ...counted,
      share: all > 0 ? counted.readings / all : 0,
      before: { readings: left },
    };
    if (on) left -= counted.takenOutFirst;
    return { ...item, after: { readings: left } };
  });
  const kept = remaining.left.reduce((n, readings, i) => (placed.passOf[i] === 0 ? n : n + readings), 0);
  return { items, total: { logged, before, after: kept } };
}

function countReadings(placed: PlacedLog): Remaining {
  const { channels, records } = placed.log;
  const logged = new Int32Array(records);
  for (const { values, rows } of channels) {
    for (let record = 0, at = 0; record < records; record++) {
      for (const end = at + rows; at < end; at++) if (values[at]! === values[at]!) logged[record]!++;
    }
  }
  const taken = channels.map(({ values }) => new Uint8Array(values.length));
  return { channels, taken, gone: new Uint8Array(records), logged, left: Int32Array.from(logged) };
}

interface Counted {
  records: number;
  readings: number;
  takenOutFirst: number;
}

function countRule(
  placed: PlacedLog,
  remaining: Remaining,
  { code, mask, on }: { code: CleaningCode; mask: RuleMask; on: boolean },
): Counted {
  if (ruleFacts(code).level === "record") return countRecords(remaining, mask.records, on);
  const touched = new Uint8Array(placed.log.records);
  const counted = { records: 0, readings: 0, takenOutFirst: 0 };
  remaining.channels.forEach((channel, order) => {
    const marks = marksOf(mask, channel, placed.geometry.rows);
    if (marks) addReadings(remaining, { channel, order, marks, on, touched }, counted);
  });
  counted.records = sum(touched);
  return counted;
}

function countRecords(remaining: Remaining, records: Uint8Array | undefined, on: boolean): Counted {
  const counted = { records: 0, readings: 0, takenOutFirst: 0 };
  if (!records) return counted;
  for (let i = 0; i < records.length; i++) {
    if (records[i] !== 1) continue;
    counted.records++;
    counted.readings += remaining.logged[i]!;
    counted.takenOutFirst += remaining.left[i]!;
    if (!on) continue;
    remaining.gone[i] = 1;
    remaining.left[i] = 0;
  }
  return counted;
}

/** The part of a mask for single readings that holds for a channel. */
function marksOf(mask: RuleMask, channel: LogChannel, rows: number): Uint8Array | null {
  const own = mask.channels?.get(channel.id);
  if (own) return own;
  if (channel.perRow) return channel.rows === rows ? (mask.cells ?? null) : null;
  return channel.rows === 1 ? (mask.whole ?? null) : null;
}

interface Adding {
  channel: LogChannel;
  order: number;
  marks: Uint8Array;
  on: boolean;
  touched: Uint8Array;
}

// kernel: walks every reading of a channel
function addReadings(remaining: Remaining, adding: Adding, counted: Counted): void {
  const { channel, marks, on, touched } = adding;
  const taken = remaining.taken[adding.order]!;
  for (let at = 0; at < marks.length; at++) {
    if (marks[at] !== 1 || channel.values[at]! !== channel.values[at]!) continue;
    const record = Math.floor(at / channel.rows);
    touched[record] = 1;
    counted.readings++;
    if (taken[at] === 1 || remaining.gone[record] === 1) continue;
    counted.takenOutFirst++;
    if (!on) continue;
    taken[at] = 1;
    remaining.left[record]!--;
  }
}

function parametersOf(code: CleaningCode, rules: CleaningRules): RuleParameter[] {
  const chosen = new Map<string, number | boolean>(Object.entries(rules[code]));
  return Object.entries(ruleFacts(code).numbers).map(([name, facts]) => ({
    name,
    label: facts.label,
    unit: facts.unit,
    value: Number(chosen.get(name) ?? facts.standard),
    standard: facts.standard,
    minimum: facts.minimum,
    maximum: facts.maximum,
    whole: facts.whole ?? false,
    channel: facts.channel ?? null,
  }));
}

function sum(values: Int32Array | Uint8Array): number {
  let total = 0;
  for (let i = 0; i < values.length; i++) total += values[i]!;
  return total;
}
