import { channelWords } from "@/lib/legend/channel-words";
import type { ChannelDelay } from "@/lib/schemas/alignment";
import type { UnitSystem } from "@/lib/units/display-unit";
import { formatNumber, formatQuantity } from "@/lib/units/format-quantity";

/** "1.5 s": delays are told to a tenth. */
export function sayDelay(delayS: number): string {
  return `${formatNumber(delayS, 1)}\u202fs`;
}

function sayDistance(distanceM: number, system: UnitSystem): string {
  return formatQuantity(distanceM, "m", system, { channel: "distance", decimals: 1 }).text;
}

function sayInterval(interval: [number, number] | null, say: (value: number) => string): string {
  return interval ? ` (${say(interval[0])} to ${say(interval[1])}, 95\u202f% interval)` : "";
}

function earlyOrLate(delayS: number): string {
  const name = sayDelay(Math.abs(delayS));
  if (Number(Math.abs(delayS).toFixed(1)) === 0) return "seems logged without delay";
  return `seems logged ${name} ${delayS > 0 ? "late" : "early"}`;
}

/** What was found about one channel, as sentences in the person's units. */
export function sayChannelDelay(item: ChannelDelay, system: UnitSystem): string[] {
  const { name } = channelWords(item.channel);
  if (item.state === "working") return [`${name} is being looked at.`];
  if (item.state === "refused" || item.delayS === null) {
    return [`No delay can be told for ${name.toLowerCase()}. ${item.reason ?? ""}`.trim()];
  }
  const pairs = `${item.pairs} pairs of neighbouring passes driven in opposite directions`;
  const found = `${name} ${earlyOrLate(item.delayS)}${sayInterval(item.delayIntervalS, sayDelay)}, from ${pairs}.`;
  if (item.separable) return [found, ...sayOwnDistance(item, system)];
  const { shiftM, usualSpeedMps } = item;
  if (shiftM === null || usualSpeedMps === null) return [found];
  const shift = sayDistance(shiftM, system);
  const speed = formatQuantity(usualSpeedMps, "m/s", system).text;
  return [
    found,
    `Speeds differ too little to tell a delay from a distance: what is known is a shift of ${shift} at ${speed}. The seconds hold if all of it is delay.`,
  ];
}

/** A distance beside the delay: the antenna is not where the machine says. */
function sayOwnDistance({ distanceM, distanceIntervalM }: ChannelDelay, system: UnitSystem): string[] {
  if (distanceM === null) return [];
  const say = (metres: number) => sayDistance(metres, system);
  const hasNone = distanceIntervalM !== null && distanceIntervalM[0] <= 0 && distanceIntervalM[1] >= 0;
  if (hasNone) return ["Besides, no distance between antenna and rows seems wrong."];
  const side = distanceM > 0 ? "behind" : "ahead of";
  return [
    `Besides, its readings belong ${say(Math.abs(distanceM))} ${side} where the machine's measures put the rows${sayInterval(distanceIntervalM, say)}: check the antenna's distance in the machine.`,
  ];
}
