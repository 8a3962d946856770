import type { CleaningRule } from "@/lib/cleaning/rule-catalogue";
import type { RuleInput, RuleMask } from "@/lib/cleaning/rule-mask";
import type { ChannelId } from "@/lib/logs/channel";
import type { LogChannel } from "@/lib/logs/machine-log";

/** At least this share of a row's unchanged records must be such that other rows changed. */
const OTHERS_VARY_SHARE = 0.5;

/**
 * Readings of a row that stayed the very same for more than `unchangedRecords` records of a pass while at least half of the
 * other rows changed, at half of those records or more. The smallest and the largest value of a channel are where sensors
 * and valves end (no load, full force): a row that stays there is not stuck, unless it never read anything else.
 */
export function findStuckSensors({ placed }: RuleInput, rule: CleaningRule<"sensor-stuck">): RuleMask {
  const channels = new Map<ChannelId, Uint8Array>();
  for (const channel of placed.log.channels) {
    if (!channel.perRow || channel.rows < 2) continue;
    channels.set(channel.id, markStuck(channel, placed.passOf, rule.unchangedRecords));
  }
  return { channels };
}

interface Ends {
  least: number;
  greatest: number;
  /** 1 for rows that only ever read one value. */
  isConstant: Uint8Array;
}

function markStuck(channel: LogChannel, passOf: Int32Array, unchangedRecords: number): Uint8Array {
  const { values, rows } = channel;
  const marks = new Uint8Array(values.length);
  const ends = findEnds(channel, passOf);
  const lengths = new Int32Array(rows);
  const varying = new Int32Array(rows);
  const close = (row: number, record: number) => {
    const length = lengths[row]!;
    const value = values[(record - 1) * rows + row]!;
    const isEnd = (value === ends.least || value === ends.greatest) && ends.isConstant[row] === 0;
    if (length > unchangedRecords && !isEnd && varying[row]! >= OTHERS_VARY_SHARE * (length - 1)) {
      for (let i = record - length; i < record; i++) marks[i * rows + row] = 1;
    }
    lengths[row] = varying[row] = 0;
  };
  for (let record = 0; record <= passOf.length; record++) {
    const isOn = record < passOf.length && passOf[record] !== 0 && record > 0 && passOf[record] === passOf[record - 1];
    const step = isOn ? countChanges(values, record * rows, rows) : NO_CHANGES;
    for (let row = 0; row < rows; row++) {
      const value = values[record * rows + row];
      const stays = isOn && value === values[(record - 1) * rows + row];
      if (stays) {
        lengths[row]!++;
        if (2 * step.changed >= step.compared - 1 && step.compared > 1) varying[row]!++;
        continue;
      }
      if (lengths[row]! > 0) close(row, record);
      lengths[row] = value === value && value !== undefined && passOf[record] !== 0 ? 1 : 0;
    }
  }
  return marks;
}

const NO_CHANGES = { changed: 0, compared: 0 };

/** How many rows can be compared with the record before, and how many of them changed. */
function countChanges(values: Float32Array, base: number, rows: number): { changed: number; compared: number } {
  let changed = 0;
  let compared = 0;
  for (let at = base; at < base + rows; at++) {
    const now = values[at]!;
    const before = values[at - rows]!;
    if (now !== now || before !== before) continue;
    compared++;
    if (now !== before) changed++;
  }
  return { changed, compared };
}

/** Smallest and largest reading in passes, and the rows that never changed. */
function findEnds({ values, rows }: LogChannel, passOf: Int32Array): Ends {
  const ends: Ends = { least: Infinity, greatest: -Infinity, isConstant: new Uint8Array(rows).fill(1) };
  const first = new Float32Array(rows).fill(NaN);
  for (let record = 0; record < passOf.length; record++) {
    if (passOf[record] === 0) continue;
    for (let row = 0; row < rows; row++) {
      const value = values[record * rows + row]!;
      if (value !== value) continue;
      if (value < ends.least) ends.least = value;
      if (value > ends.greatest) ends.greatest = value;
      if (first[row] !== first[row]) first[row] = value;
      else if (value !== first[row]) ends.isConstant[row] = 0;
    }
  }
  return ends;
}
