import type { LogChannel } from "@/lib/logs/machine-log";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { passSteps } from "@/lib/rows/pass-members";

/** A row silent in the middle of a pass was switched off where it is so for this many records and metres; else it missed some. */
const SILENT = { records: 5, lengthM: 5 };

/**
 * 1 where a row's section was switched off, laid out like a channel; null where none ever was. Off is a row without a
 * reading in any channel, in a pass in which it has some: at the pass's start or finish, or for 5 records and 5 m within.
 * A row that is silent all through a pass has a broken sensor for all we know, and counts as worked.
 */
export function findSwitchedOff(placed: PlacedLog): Uint8Array | null {
  const channels = placed.log.channels.filter((channel) => channel.perRow);
  if (channels.length === 0) return null;
  const { rows } = placed.geometry;
  let off: Uint8Array | null = null;
  for (const pass of placed.passes) {
    if (!hasMissing(channels[0]!, pass)) continue;
    const records = passSteps(placed, pass).map((step) => step.record);
    off ??= new Uint8Array(placed.log.records * rows);
    for (let row = 0; row < rows; row++) markRow(placed, { channels, records, row, off });
  }
  return off;
}

function hasMissing({ values, rows }: LogChannel, pass: Pass): boolean {
  const end = (pass.first + pass.records) * rows;
  for (let at = pass.first * rows; at < end; at++) if (Number.isNaN(values[at]!)) return true;
  return false;
}

function isSilent(channels: readonly LogChannel[], record: number, row: number): boolean {
  return channels.every((channel) => Number.isNaN(channel.values[record * channel.rows + row]!));
}

interface RowOfPass {
  channels: readonly LogChannel[];
  records: readonly number[];
  row: number;
  off: Uint8Array;
}

function markRow(placed: PlacedLog, { channels, records, row, off }: RowOfPass): void {
  const { rows } = placed.geometry;
  for (let k = 0; k < records.length;) {
    if (!isSilent(channels, records[k]!, row)) {
      k++;
      continue;
    }
    let end = k + 1;
    while (end < records.length && isSilent(channels, records[end]!, row)) end++;
    if (end - k === records.length) return;
    const isEdge = k === 0 || end === records.length;
    if (isEdge || isLong(placed, records, k, end)) {
      for (let at = k; at < end; at++) off[records[at]! * rows + row] = 1;
    }
    k = end;
  }
}

function isLong(placed: PlacedLog, records: readonly number[], first: number, end: number): boolean {
  const [a, b] = [records[first]!, records[end - 1]!];
  const lengthM = Math.hypot(
    placed.originEastM[b]! - placed.originEastM[a]!,
    placed.originNorthM[b]! - placed.originNorthM[a]!,
  );
  return end - first >= SILENT.records && lengthM >= SILENT.lengthM;
}
