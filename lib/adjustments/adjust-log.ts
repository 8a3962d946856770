import { isAsRead, type Adjustments } from "@/lib/adjustments/adjustments";
import { shiftChannel } from "@/lib/adjustments/shift-channel";
import { chosenRules } from "@/lib/cleaning/default-rules";
import { findRuleMask } from "@/lib/cleaning/find-rule-mask";
import { combineMasks, withoutLeftOut, type LeftOut } from "@/lib/cleaning/left-out";
import { distanceAlongPasses } from "@/lib/cleaning/rule-mask";
import type { PlacedLog } from "@/lib/logs/placed-log";

/** A log as its adjustments show it, and what they leave out. */
export interface AdjustedLog {
  placed: PlacedLog;
  /** Null where no rule that can be switched is on. */
  cleaned: LeftOut | null;
}

/** Channels moved in time by their delays; the very log where there are none. */
export function shiftLog(placed: PlacedLog, delaysS: Adjustments["delaysS"]): PlacedLog {
  const channels = placed.log.channels.map((channel) => shiftChannel(placed, channel, delaysS[channel.id] ?? 0));
  if (channels.every((channel, k) => channel === placed.log.channels[k])) return placed;
  return { ...placed, log: { ...placed.log, channels } };
}

/** What the rules that are on leave out of a log whose channels were moved already; null where none is on. */
export function findLeftOut(shifted: PlacedLog, cleaning: Adjustments["cleaning"]): LeftOut | null {
  const codes = chosenRules(cleaning);
  if (codes.length === 0) return null;
  const input = { placed: shifted, alongM: distanceAlongPasses(shifted) };
  const masks = codes.map((code) => ({ code, mask: findRuleMask(code, input, cleaning[code]) }));
  return combineMasks(shifted.geometry.rows, masks);
}

/** Puts NaN in copies of the channels where a reading is left out. Passes, distances and coverage stay as they were. */
export function leaveOut(shifted: PlacedLog, cleaned: LeftOut | null): PlacedLog {
  if (!cleaned) return shifted;
  const channels = shifted.log.channels.map((channel) => withoutLeftOut(channel, cleaned));
  return { ...shifted, leftOut: cleaned, log: { ...shifted.log, channels } };
}

/**
 * A log with its adjustments: first every channel is moved along time by its delay, then the rules that are on leave out
 * readings. The log given is never written to; where nothing applies the answer is the very same object.
 */
export function adjustLog(placed: PlacedLog, adjustments: Adjustments): AdjustedLog {
  if (isAsRead(adjustments)) return { placed, cleaned: null };
  const shifted = shiftLog(placed, adjustments.delaysS);
  const cleaned = findLeftOut(shifted, adjustments.cleaning);
  return { placed: leaveOut(shifted, cleaned), cleaned };
}
