import type { ChannelDelay } from "@/lib/schemas/alignment";

/**
 * A shorter delay that remains is not worth a note, nor a shorter distance: a controlled force answers the ground up to
 * about so late without any fault of the log.
 */
const WORTH_TELLING = { delayS: 0.8, distanceM: 0.5 };

interface LookNote {
  code: string;
  count: number;
  message: string;
}

/** Codes of the notes of this file. */
export const LATE_CHANNEL = "channel-late";
export const ROWS_DISPLACED = "rows-displaced";

type Told = Pick<
  ChannelDelay,
  "channel" | "state" | "delayS" | "delayIntervalS" | "distanceM" | "distanceIntervalM" | "separable" | "applied"
>;

/**
 * One note a channel whose delay stands out from what the log's adjustments take out already, and one where the rows
 * themselves seem displaced. `nameChannel` gives a channel's name as a sentence begins with it.
 */
export function sayLateChannels(delays: readonly Told[], nameChannel: (id: string) => string): LookNote[] {
  return delays.flatMap((delay) => [...lateNote(delay, nameChannel), ...displacedNote(delay, nameChannel)]);
}

function lateNote(delay: Told, nameChannel: (id: string) => string): LookNote[] {
  if (delay.state !== "estimated" || delay.delayS === null || !delay.delayIntervalS) return [];
  const applied = delay.applied ?? 0;
  const restS = delay.delayS - applied;
  const [from, to] = delay.delayIntervalS;
  const isCertain = from > applied || to < applied;
  if (Math.abs(restS) < WORTH_TELLING.delayS || !isCertain) return [];
  const isLate = restS > 0;
  const [least, most] = isLate ? [from - applied, to - applied] : [applied - to, applied - from];
  const seconds = `${tenths(Math.abs(restS))} s ${isLate ? "late" : "early"} (${tenths(least)} to ${tenths(most)} s)`;
  const still = applied === 0 ? "seems" : "still seems";
  const doubt = delay.separable ? "" : ", if it is a delay and not a distance";
  const message = `${nameChannel(delay.channel)} ${still} logged ${seconds}${doubt}: see the delay of the channels under cleaning.`;
  return [{ code: LATE_CHANNEL, count: 1, message }];
}

function displacedNote(delay: Told, nameChannel: (id: string) => string): LookNote[] {
  if (delay.state !== "estimated" || delay.distanceM === null || !delay.distanceIntervalM) return [];
  const [from, to] = delay.distanceIntervalM;
  if (Math.abs(delay.distanceM) < WORTH_TELLING.distanceM || from * to <= 0) return [];
  const isBehind = delay.distanceM > 0;
  const [least, most] = isBehind ? [from, to] : [-to, -from];
  const metres = `${tenths(Math.abs(delay.distanceM))} m (${tenths(least)} to ${tenths(most)} m)`;
  const message =
    `By ${lowerFirst(nameChannel(delay.channel))}, the rows seem to run ${metres} further ${isBehind ? "back" : "forward"} than ` +
    "the machine's measures put them: check the distance from antenna to rows.";
  return [{ code: ROWS_DISPLACED, count: 1, message }];
}

function tenths(value: number): string {
  return (Math.round(value * 10) / 10 + 0).toFixed(1);
}

function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}
