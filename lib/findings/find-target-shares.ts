import { liftedBelowN, wheelLoads } from "@/lib/ballast/frame-balance";
import { CAUTIONS } from "@/lib/findings/cautions";
import type { Finding } from "@/lib/findings/finding";
import { makeFinding, sayRows, startSentence } from "@/lib/findings/make-finding";
import { stretchPlace } from "@/lib/findings/place-lines";
import { rowsFrom, VERDICT_THRESHOLDS, type VerdictInput } from "@/lib/findings/verdict-input";
import { mapRowSeries, rowSeries } from "@/lib/statistics/row-series";
import { atLimitFromN, distanceShare, longestStretch, underTargetBelowN } from "@/lib/statistics/row-shares";

const LIMIT = VERDICT_THRESHOLDS;

/** Rows under the target margin, and whether their force was at its limit meanwhile; or the word that all held it. */
export function findUnderTarget(input: VerdictInput): Finding[] {
  const { placed, margin } = input;
  const below = margin && underTargetBelowN(placed, margin.channel);
  if (!margin || below === null) return [];
  const { rows, worst, worstShare } = rowsFrom(margin, "shareUnderTarget", LIMIT.underTargetShare);
  const method = `Share of distance with margin under target less deadband; rows count from ${100 * LIMIT.underTargetShare} %.`;
  if (rows.length === 0) return [sayHeld(placed.geometry.rows, method)];
  const stretch = longestStretch(
    placed,
    rowSeries(placed, margin.channel, input.distances, worst - 1),
    (x) => x < below,
  );
  const reason = sayReason(input, rows, below);
  return [
    makeFinding({
      kind: "rows-under-target",
      severity: worstShare >= LIMIT.actUnderTargetShare ? "act" : "look",
      sentenceTemplate: `${rows.length === 1 ? ONE_UNDER : SEVERAL_UNDER}${reason.text}`,
      values: {
        count: { value: rows.length, unit: "1" },
        all: { value: placed.geometry.rows, unit: "1" },
        from: { value: LIMIT.underTargetShare, unit: "fraction" },
        worst: { value: worst, unit: "1" },
        share: { value: worstShare, unit: "fraction" },
        longest: { value: stretch?.lengthM ?? 0, unit: "m" },
        ...reason.values,
      },
      value: worstShare,
      unit: "fraction",
      method,
      place: stretchPlace(placed, worst, stretch),
      check: "Dig behind the worst row and a good one at the place shown: depth, and straw pushed into the furrow.",
      caution: CAUTIONS.digging,
      rows,
    }),
  ];
}

const ONE_UNDER = "Row {worst} ran under the target margin on {share} of its distance, for {longest} at a stretch.";
const SEVERAL_UNDER =
  "{count} of {all} rows ran under the target margin on at least {from} of their distance; row {worst} most, on {share}, for {longest} at a stretch.";
const ONE_AT_LIMIT = "Row {worst} had no more force to give on {share} of its distance.";
const SEVERAL_AT_LIMIT =
  "{count} of {all} rows had no more force to give on at least {from} of their distance; row {worst} most, on {share}.";

function sayHeld(rows: number, method: string): Finding {
  return makeFinding({
    kind: "target-held",
    severity: "ok",
    sentenceTemplate: "All {all} rows held the target margin on more than {held} of their distance.",
    values: { all: { value: rows, unit: "1" }, held: { value: 1 - LIMIT.underTargetShare, unit: "fraction" } },
    value: 1 - LIMIT.underTargetShare,
    unit: "fraction",
    method,
    check: "Dig a few places all the same: margin says the wheel was down, not how deep the seed lies.",
    caution: CAUTIONS.digging,
  });
}

interface Reason {
  text: string;
  values: Finding["values"];
}

/**
 * What force and frame were doing while rows were under target. Rows that stand out from the rest are left out, since
 * their lack has its own finding; silent where fewer than half the rows remain.
 */
function sayReason(input: VerdictInput, rows: number[], below: number): Reason {
  const items = input.margin?.statistics.items ?? [];
  const common = rows.filter((row) => items[row - 1]?.flagged !== true);
  const silent = { text: "", values: {} };
  if (common.length * 2 < items.length) return silent;
  const lifted = shareWhileUnder(input, { rows: common, below, holds: liftedReadings(input) });
  if (lifted !== null && lifted >= 0.4) {
    const text = " On {lifted} of that the frame was lifted: consistent with too little weight on it.";
    return { text, values: { lifted: { value: lifted, unit: "fraction" } } };
  }
  const limited = shareWhileUnder(input, { rows: common, below, holds: limitedReadings(input) });
  if (limited === null) return silent;
  if (limited < 0.5) {
    return {
      ...silent,
      text: " The force was below its limit on most of that: consistent with the setting or a slow system.",
    };
  }
  const text =
    " On {limited} of that the force stood at its limit: consistent with too little force or weight for this ground.";
  return { text, values: { limited: { value: limited, unit: "fraction" } } };
}

type ReadingTest = ((record: number, at: number) => boolean) | null;

function liftedReadings({ placed, downforce }: VerdictInput): ReadingTest {
  const frame = placed.machine?.frame;
  if (!frame || !downforce || downforce.channel.unit !== "N") return null;
  const loads = wheelLoads(placed, frame, downforce.channel.values);
  const limit = liftedBelowN(frame);
  return (record) => loads[record]! <= limit;
}

function limitedReadings({ placed, downforce }: VerdictInput): ReadingTest {
  const from = downforce && atLimitFromN(placed, downforce.channel);
  return downforce && from !== null ? (_, at) => downforce.channel.values[at]! >= from : null;
}

/** Of the distance that `rows` ran under target, the share for which `holds`; null where that cannot be known. */
function shareWhileUnder(
  input: VerdictInput,
  { rows, below, holds }: { rows: number[]; below: number; holds: ReadingTest },
): number | null {
  if (!input.margin || !holds) return null;
  const { values, rows: width } = input.margin.channel;
  let under = 0;
  let both = 0;
  for (let record = 0; record < input.placed.log.records; record++) {
    for (const row of rows) {
      const at = record * width + row - 1;
      if (!(values[at]! < below)) continue;
      under += input.distances[at]!;
      if (holds(record, at)) both += input.distances[at]!;
    }
  }
  return under > 0 ? both / under : null;
}

export function findAtLimit(input: VerdictInput): Finding[] {
  const { placed, downforce } = input;
  const from = downforce && atLimitFromN(placed, downforce.channel);
  if (!downforce || from === null) return [];
  const { rows, worst, worstShare } = rowsFrom(downforce, "shareAtLimit", LIMIT.atLimitShare);
  if (rows.length === 0) return [];
  const stretch = longestStretch(
    placed,
    rowSeries(placed, downforce.channel, input.distances, worst - 1),
    (x) => x >= from,
  );
  return [
    makeFinding({
      kind: "rows-at-limit",
      severity: "look",
      sentenceTemplate: rows.length === 1 ? ONE_AT_LIMIT : SEVERAL_AT_LIMIT,
      values: {
        count: { value: rows.length, unit: "1" },
        all: { value: placed.geometry.rows, unit: "1" },
        from: { value: LIMIT.atLimitShare, unit: "fraction" },
        worst: { value: worst, unit: "1" },
        share: { value: worstShare, unit: "fraction" },
      },
      value: worstShare,
      unit: "fraction",
      method:
        "Share of distance with force at the machine's limit less 1 % or the log's own rounding, whichever is larger.",
      place: stretchPlace(placed, worst, stretch),
      check: "A force at its limit is not a target met: check margin and depth there.",
      rows,
    }),
  ];
}

export function findContactLost(input: VerdictInput): Finding[] {
  const evidence = input.contact ?? input.margin;
  const { rows, worst, worstShare } = rowsFrom(evidence, "shareContactLost", LIMIT.contactLostShare);
  if (!evidence || rows.length === 0) return [];
  const lost = (value: number) => (evidence.channel.id === "contact" ? value < 1 : value <= 0);
  const series = rowSeries(input.placed, evidence.channel, input.distances, worst - 1);
  return [
    makeFinding({
      kind: "contact-lost",
      severity: "act",
      sentenceTemplate: `${startSentence(sayRows(rows))} had the gauge wheel off the ground on at least {from} of the distance; row {worst} on {share}.`,
      values: {
        from: { value: LIMIT.contactLostShare, unit: "fraction" },
        worst: { value: worst, unit: "1" },
        share: { value: worstShare, unit: "fraction" },
      },
      value: worstShare,
      unit: "fraction",
      method:
        evidence.channel.id === "contact"
          ? "What the logged contact leaves to full, averaged over distance; how the machine defines contact is its own affair."
          : "Share of distance with a margin of 0 or less.",
      place: stretchPlace(input.placed, worst, longestStretch(input.placed, series, lost)),
      check: "Seed depth was not held there: dig behind those rows.",
      caution: CAUTIONS.digging,
      rows,
    }),
  ];
}

/** Margin above target and deadband on more than half the distance; says nothing about compaction, which the log cannot show. */
export function findOverTarget({ placed, margin, distances }: VerdictInput): Finding[] {
  const target = placed.machine?.targetMarginN;
  const deadband = placed.machine?.marginDeadbandN;
  if (!margin || target === undefined || !deadband || margin.channel.unit !== "N") return [];
  const isOver = (value: number) => value > target + deadband;
  const shares = mapRowSeries(placed, margin.channel, distances, (series) => distanceShare(series, isOver) ?? 0);
  const rows = shares.flatMap((share, k) => (share >= LIMIT.overTargetShare ? [k + 1] : []));
  if (rows.length * 2 < shares.length) return [];
  const mean = rows.reduce((sum, row) => sum + shares[row - 1]!, 0) / rows.length;
  return [
    makeFinding({
      kind: "over-target",
      severity: "look",
      sentenceTemplate: "{count} of {all} rows carried more than the target margin on {share} of their distance.",
      values: {
        count: { value: rows.length, unit: "1" },
        all: { value: shares.length, unit: "1" },
        share: { value: mean, unit: "fraction" },
      },
      value: mean,
      unit: "fraction",
      method: "Share of distance with margin above target plus deadband, mean of the rows where that is over half.",
      check:
        "Look at the furrow wall where the soil was moist. Whether the soil was packed cannot be read from the log.",
      caution: CAUTIONS.digging,
      rows,
    }),
  ];
}
