import {
  comparedSide,
  figureOf,
  LEAST_BLOCKS,
  spreadFigure,
  wholeFigure,
  type ComparedSide,
  type Drawing,
} from "@/lib/comparison/compared-side";
import { beyondOthers, differenceInterval, type DrawnFigure } from "@/lib/comparison/difference-interval";
import { doubtRows } from "@/lib/comparison/doubt-rows";
import type { LogToCompare } from "@/lib/comparison/log-to-compare";
import { sayCautions } from "@/lib/comparison/say-cautions";
import { shareValues } from "@/lib/comparison/share-values";
import type { ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import type {
  ComparedBlocks,
  ComparedLog,
  ComparedMeasure,
  ComparedRow,
  ComparedRowSide,
  ComparisonBody,
  Told,
} from "@/lib/schemas/comparison";
import { finiteOrNull } from "@/lib/statistics/finite-or-null";
import { median } from "@/lib/statistics/median";
import { describeRows, FLAG_DEVIATION_SHARE, type RowStatisticsItem } from "@/lib/statistics/row-statistics";

/**
 * One channel in a log before a change and in one after it. Passes inside the field are the units that repeat; runs of
 * neighbouring passes are drawn anew as blocks, as long as neighbours are alike. Each log is drawn on its own: their passes are no pairs.
 */
export function compareLogs(before: LogToCompare, after: LogToCompare): ComparisonBody {
  const { channel } = before.from;
  const centre = middleReading(before.from);
  const a = comparedSide(before.from, { label: "before", centre });
  const b = comparedSide(after.from, { label: "after", centre });
  const paired = whyUnpaired(a, b);
  const doubts = paired === null ? doubtsOfRows(before, after, [a, b]) : [];
  const short = [
    ...whyNoInterval(before.name, a.whole, "of all rows together"),
    ...whyNoInterval(after.name, b.whole, "of all rows together"),
    ...(paired === null ? whyNoInterval(before.name, a.rows, "of rows against each other") : []),
    ...(paired === null ? whyNoInterval(after.name, b.rows, "of rows against each other") : []),
  ];
  return {
    channel: channel.id,
    unit: channel.unit,
    before: describeLog(before, a),
    after: describeLog(after, b),
    overall: compareWhole(a, b),
    rows: paired === null ? compareRows(a, b, { mayTell: doubts.length === 0 }) : [],
    distribution: shareValues(a.from, b.from),
    reasons: [...short, ...(paired === null ? doubts : [paired])],
    cautions: sayCautions({ log: before, side: a }, { log: after, side: b }),
  };
}

/** Any finite reading, to take squares about. */
function middleReading({ channel }: ChannelOnGround): number {
  return channel.values.find((value) => Number.isFinite(value)) ?? 0;
}

function describeLog({ logId, name, fieldId, startedAt }: LogToCompare, side: ComparedSide): ComparedLog {
  const { rows } = side.from.channel;
  let weight = 0;
  for (let pass = 0; pass < side.sums.passes; pass++) weight += side.sums.weights[pass * side.sums.parts + rows]!;
  return {
    logId,
    name,
    fieldId,
    startedAt,
    passes: side.from.placed.passes.length,
    headlandPassesLeftOut: side.headlandPassesLeftOut,
    whole: sayBlocks(side.whole),
    rows: sayBlocks(side.rows),
    distanceM: weight / rows,
    targetMarginN: side.from.placed.machine?.targetMarginN ?? null,
  };
}

function sayBlocks({ blocks: { blocks, passesPerBlock, correlation } }: Drawing): ComparedBlocks {
  return { blocks, passesPerBlock, correlation: finiteOrNull(correlation) };
}

function whyNoInterval(name: string, { blocks }: Drawing, what: string): string[] {
  if (blocks.blocks >= LEAST_BLOCKS) return [];
  const { passes, passesPerBlock } = blocks;
  const needs = `An interval ${what} needs ${LEAST_BLOCKS} passes on either side`;
  if (passes < LEAST_BLOCKS) return [`${needs}; ${name} has ${passes}.`];
  return [
    `${needs} that are not alike; in ${name} ${passesPerBlock} neighbouring passes are so alike that its ${passes} count as ${blocks.blocks}.`,
  ];
}

function whyUnpaired(a: ComparedSide, b: ComparedSide): string | null {
  const [first, second] = [a.from.channel, b.from.channel];
  if (!first.perRow || !second.perRow)
    return "The channel is logged once for the whole machine, so rows cannot be compared.";
  if (first.rows !== second.rows)
    return `One log has ${first.rows} rows and the other ${second.rows}: rows cannot be paired.`;
  return null;
}

function doubtsOfRows(before: LogToCompare, after: LogToCompare, [a, b]: [ComparedSide, ComparedSide]): string[] {
  const doubts = [
    doubtRows(a.from.placed, before.name, before.harvestAxesDeg),
    doubtRows(b.from.placed, after.name, after.harvestAxesDeg),
  ];
  return doubts.filter((doubt) => doubt !== null);
}

function tellDifference(interval: [number, number] | null): Told {
  if (interval === null || (interval[0] <= 0 && interval[1] >= 0)) return "cannot-tell";
  return interval[0] > 0 ? "more" : "less";
}

function compareWhole(a: ComparedSide, b: ComparedSide): ComparedMeasure[] {
  const { unit } = a.from.channel;
  const drawn = a.whole.drawn !== null && b.whole.drawn !== null;
  const compare = (measure: ComparedMeasure["measure"], own: string, [first, second]: [DrawnFigure, DrawnFigure]) => {
    const interval = drawn ? differenceInterval(first, second) : null;
    const [before, after] = [finiteOrNull(first.value), finiteOrNull(second.value)];
    const difference = finiteOrNull(second.value - first.value);
    return { measure, unit: own, before, after, difference, interval, told: tellDifference(interval) };
  };
  const shares = [
    compare("share-under-target", "fraction", [wholeFigure(a, "under"), wholeFigure(b, "under")]),
    compare("share-at-limit", "fraction", [wholeFigure(a, "limit"), wholeFigure(b, "limit")]),
    compare("share-contact-lost", "fraction", [wholeFigure(a, "lost"), wholeFigure(b, "lost")]),
  ];
  return [
    compare("mean", unit, [wholeFigure(a, "mean"), wholeFigure(b, "mean")]),
    compare("spread", unit, [spreadFigure(a), spreadFigure(b)]),
    // A share that neither log has is no measure of them.
    ...shares.filter(({ before, after }) => before !== null || after !== null),
  ];
}

function compareRows(a: ComparedSide, b: ComparedSide, { mayTell }: { mayTell: boolean }): ComparedRow[] {
  const [described, describedAfter] = [a, b].map(({ from }) => describeRows(from.placed, from.channel, from.distances));
  const rows = Array.from({ length: a.from.channel.rows }, (_, row) => row);
  const areDrawn = a.rows.drawn !== null && b.rows.drawn !== null;
  const against = [a, b].map((side) => rows.map((row) => figureOf(side, side.rows, row)));
  const beyond = areDrawn ? beyondOthers(against[0]!, against[1]!) : null;
  const isDrawn = a.whole.drawn !== null && b.whole.drawn !== null;
  const differences = rows.map((row) => b.means[row]! - a.means[row]!);
  const middle = median(differences);
  const least = FLAG_DEVIATION_SHARE * Math.abs(described!.medianOfRows);
  return rows.map((row) => {
    const own = [a, b].map((side) => figureOf(side, side.whole, row));
    const beyondInterval = beyond?.[row]?.interval ?? null;
    return {
      row: row + 1,
      before: rowSide(described!.items[row]!),
      after: rowSide(describedAfter!.items[row]!),
      difference: finiteOrNull(differences[row]!),
      interval: isDrawn ? differenceInterval(own[0]!, own[1]!) : null,
      beyondOthers: finiteOrNull(differences[row]! - middle),
      beyondInterval,
      told: mayTell ? tellRow(differences[row]! - middle, beyondInterval, least) : "cannot-tell",
    };
  });
}

/** A step that the rule for rows that stand out would not look at is too small to speak of: it may be a sensor's zero. */
function tellRow(beyond: number, interval: [number, number] | null, least: number): ComparedRow["told"] {
  const told = tellDifference(interval);
  return told !== "cannot-tell" && Math.abs(beyond) <= least ? "too-small" : told;
}

function rowSide(item: RowStatisticsItem): ComparedRowSide {
  const { mean, p05, p25, p50, p75, p95, shareUnderTarget, shareAtLimit } = item;
  return { mean, p05, p25, p50, p75, p95, shareUnderTarget, shareAtLimit };
}
