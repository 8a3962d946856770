import { CAUTIONS } from "@/lib/findings/cautions";
import type { Finding } from "@/lib/findings/finding";
import { makeFinding, sayRows, startSentence } from "@/lib/findings/make-finding";
import { stretchPlace } from "@/lib/findings/place-lines";
import { rowsFrom, VERDICT_THRESHOLDS, type VerdictInput } from "@/lib/findings/verdict-input";
import { rowSeries } from "@/lib/statistics/row-series";
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
  const limited = shareAtLimitWhileUnder(input, below);
  const reason =
    limited === null
      ? ""
      : limited >= 0.5
        ? " On {limited} of that the force stood at its limit: consistent with too little weight or too high a resistance."
        : " The force was below its limit on most of that: consistent with the target setting or a slow system.";
  return [
    makeFinding({
      kind: "rows-under-target",
      severity: "act",
      sentenceTemplate:
        `{count} of {all} rows ran under the target margin on at least {from} of their distance; row {worst} most, on ` +
        `{share}, for {longest} at a stretch.${reason}`,
      values: {
        count: { value: rows.length, unit: "1" },
        all: { value: placed.geometry.rows, unit: "1" },
        from: { value: LIMIT.underTargetShare, unit: "fraction" },
        worst: { value: worst, unit: "1" },
        share: { value: worstShare, unit: "fraction" },
        longest: { value: stretch?.lengthM ?? 0, unit: "m" },
        ...(limited === null ? {} : { limited: { value: limited, unit: "fraction" } }),
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

/** Of the readings under target, the share (by distance) with the same row's force at its limit; null without forces or a limit. */
function shareAtLimitWhileUnder({ placed, margin, downforce, distances }: VerdictInput, below: number): number | null {
  const from = downforce && atLimitFromN(placed, downforce.channel);
  if (!margin || !downforce || from === null) return null;
  let under = 0;
  let both = 0;
  for (let at = 0; at < margin.channel.values.length; at++) {
    if (!(margin.channel.values[at]! < below) || Number.isNaN(downforce.channel.values[at]!)) continue;
    under += distances[at]!;
    if (downforce.channel.values[at]! >= from) both += distances[at]!;
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
      sentenceTemplate:
        "{count} of {all} rows had no more force to give on at least {from} of their distance; row {worst} most, on {share}.",
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
  const shares = margin.statistics.items.map((item) => {
    const series = rowSeries(placed, margin.channel, distances, item.row - 1);
    return distanceShare(series, (value) => value > target + deadband) ?? 0;
  });
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
