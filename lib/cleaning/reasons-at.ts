import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import { reasonOf, type LeftOut } from "@/lib/cleaning/left-out";
import { CLEANING_CODES, ruleFacts, type CleaningCode } from "@/lib/cleaning/rule-catalogue";
import type { ChannelId } from "@/lib/logs/channel";

/** A reason why readings of one record and row are left out, and whose they are. */
export interface Reason {
  code: CleaningCode;
  words: string;
  channels: string[];
}

/** What the rules take out at one record and row (from 1), in the order of the rules. */
export function reasonsAt(
  out: LeftOut | null,
  { channels, record, row }: { channels: readonly ResolvedChannel[]; record: number; row: number },
): Reason[] {
  if (!out) return [];
  const found = new Map<number, string[]>();
  for (const { id, rows, perRow } of channels) {
    const number = reasonOf(out, { id: id as ChannelId, rows, perRow }, record, row - 1);
    if (number > 0) found.set(number, [...(found.get(number) ?? []), id]);
  }
  return [...found.entries()]
    .sort(([a], [b]) => a - b)
    .flatMap(([number, ids]) => {
      const code = CLEANING_CODES[number - 1];
      return code ? [{ code, words: ruleFacts(code).label, channels: ids }] : [];
    });
}
