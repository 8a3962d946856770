import type { CleaningRule } from "@/lib/cleaning/rule-catalogue";
import { passMembers, type RuleInput, type RuleMask } from "@/lib/cleaning/rule-mask";
import type { ChannelId } from "@/lib/logs/channel";
import type { LogChannel } from "@/lib/logs/machine-log";
import { selectRank } from "@/lib/statistics/middle-readings";

/** Median absolute deviations of a normal distribution make a standard deviation by this factor. */
const MAD_TO_SD = 1.4826;
/** Fewer readings than this say nothing about what is usual. */
const FEWEST = 5;
/** Where no other row confirms it, at least so many neighbours are asked: the spread of a few is often far too small. */
const ALONE = 30;
/** 0 and 1 are both usual for these: what stands alone there is the very event that they log. */
const NOT_JUDGED: ReadonlySet<ChannelId> = new Set<ChannelId>(["contact", "working"]);

/**
 * Readings more than `maxSpreads` robust standard deviations (1.4826 MAD about the median, at least one step of the channel)
 * off both the readings of the same row within `withinM` along its pass and those of the other rows at the same record. A
 * channel logged once for the whole machine has no other rows: the first alone decides, on the 30 nearest readings at least.
 * Not judged: contact, yes/no channels.
 */
export function findLocalOutliers({ placed, alongM }: RuleInput, rule: CleaningRule<"local-outlier">): RuleMask {
  const channels = new Map<ChannelId, Uint8Array>();
  for (const channel of placed.log.channels) {
    if (NOT_JUDGED.has(channel.id) || channel.unit === "boolean") continue;
    const marks = new Uint8Array(channel.values.length);
    for (const pass of placed.passes) {
      const members = passMembers(placed, pass);
      const suspects = channel.rows > 1 ? suspectsOf(channel, members, rule.maxSpreads) : everyReading(members);
      confirm(channel, { members, alongM, rule, suspects, marks });
    }
    channels.set(channel.id, marks);
  }
  return { channels };
}

/** A reading to look at: place of its record among the members of the pass, and its row from 0. */
interface Suspect {
  member: number;
  row: number;
}

function everyReading(members: readonly number[]): Suspect[] {
  return members.map((_, member) => ({ member, row: 0 }));
}

/** Readings that stand far off the other rows of their record. Only the furthest off is measured where nothing is. */
// kernel: hot loop over every reading
function suspectsOf({ values, rows, resolution }: LogChannel, members: readonly number[], limit: number): Suspect[] {
  const suspects: Suspect[] = [];
  const room = new Float32Array(rows);
  for (let member = 0; member < members.length; member++) {
    const base = members[member]! * rows;
    let n = 0;
    let least = Infinity;
    let greatest = -Infinity;
    for (let row = 0; row < rows; row++) {
      const value = values[base + row]!;
      if (value !== value) continue;
      room[n++] = value;
      if (value < least) least = value;
      if (value > greatest) greatest = value;
    }
    if (n < FEWEST || greatest === least) continue;
    const middle = medianOf(room, n);
    const furthest = Math.max(greatest - middle, middle - least);
    // Over `limit` spreads off means: at least half of the readings lie within this of the middle.
    if (!isHalfWithin(room, n, middle, furthest / (MAD_TO_SD * limit))) continue;
    for (let i = 0; i < n; i++) room[i] = Math.abs(room[i]! - middle);
    const spread = Math.max(MAD_TO_SD * medianOf(room, n), resolution ?? 0);
    if (!(spread > 0)) continue;
    for (let row = 0; row < rows; row++) {
      if (Math.abs(values[base + row]! - middle) > limit * spread) suspects.push({ member, row });
    }
  }
  return suspects;
}

// kernel: hot, so positional
function isHalfWithin(values: Float32Array, n: number, middle: number, distance: number): boolean {
  let within = 0;
  for (let i = 0; i < n; i++) if (Math.abs(values[i]! - middle) <= distance) within++;
  return 2 * within >= n;
}

/** Median of the first `n` values, which are moved about. */
function medianOf(values: Float32Array, n: number): number {
  const middle = (n - 1) >> 1;
  selectRank(values, n, middle);
  if (n % 2 === 1) return values[middle]!;
  let above = Infinity;
  for (let i = middle + 1; i < n; i++) if (values[i]! < above) above = values[i]!;
  return (values[middle]! + above) / 2;
}

interface Confirming {
  members: readonly number[];
  alongM: Float64Array;
  rule: CleaningRule<"local-outlier">;
  suspects: readonly Suspect[];
  marks: Uint8Array;
}

/** Marks the suspects that stand far off the same row close by, too. */
function confirm(channel: LogChannel, { members, alongM, rule, suspects, marks }: Confirming): void {
  const { values, rows, resolution } = channel;
  const room = new Float32Array(members.length);
  for (const { member, row } of suspects) {
    const place = members[member]! * rows + row;
    const value = values[place]!;
    if (value !== value) continue;
    const here = alongM[members[member]!]!;
    let n = 0;
    const take = (other: number) => {
      const reading = values[members[other]! * rows + row]!;
      if (reading === reading) room[n++] = reading;
    };
    const reach = rows > 1 ? 0 : ALONE / 2;
    const isNear = (k: number) =>
      Math.abs(k - member) <= reach || Math.abs(alongM[members[k]!]! - here) <= rule.withinM;
    for (let k = member - 1; k >= 0 && isNear(k); k--) take(k);
    for (let k = member + 1; k < members.length && isNear(k); k++) take(k);
    if (n < FEWEST) continue;
    const middle = medianOf(room, n);
    for (let i = 0; i < n; i++) room[i] = Math.abs(room[i]! - middle);
    const spread = Math.max(MAD_TO_SD * medianOf(room, n), resolution ?? 0);
    if (spread > 0 && Math.abs(value - middle) > rule.maxSpreads * spread) marks[place] = 1;
  }
}
