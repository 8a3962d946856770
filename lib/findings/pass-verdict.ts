import { measureFrameBalance, type FrameBalance } from "@/lib/ballast/frame-balance";
import type { Finding } from "@/lib/findings/finding";
import { findOddRows } from "@/lib/findings/find-odd-rows";
import { findAtLimit, findContactLost, findOverTarget, findUnderTarget } from "@/lib/findings/find-target-shares";
import { doubtBalance } from "@/lib/findings/doubt-balance";
import { doubtReadings } from "@/lib/findings/doubt-readings";
import { findWeight } from "@/lib/findings/find-weight";
import { makeFinding } from "@/lib/findings/make-finding";
import { channelEvidence } from "@/lib/findings/row-evidence";
import { rowsFrom, VERDICT_THRESHOLDS, type VerdictInput } from "@/lib/findings/verdict-input";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { atLimitFromN, underTargetBelowN } from "@/lib/statistics/row-shares";
import { MIN_ROWS_TO_RANK } from "@/lib/statistics/row-deviation";
import type { RowStatistics } from "@/lib/statistics/row-statistics";

export interface PassVerdict {
  /** Rows under target (margin < target - deadband) on at least 10 % of their distance. */
  rowsUnderTarget: number[];
  /** Rows at their force limit on at least 5 % of their distance. */
  rowsAtLimit: number[];
  /** Whether the two lists above could be made at all: an empty list that is not known is no "none". */
  known: { underTarget: boolean; atLimit: boolean };
  weight: Pick<FrameBalance, "headroomN" | "shareLiftedM2" | "state" | "missing" | "liftOffForcePerRowN">;
  /** The most important first. */
  findings: Finding[];
  /** Ids of the at most three findings to say first. */
  headline: string[];
  /** Rows that stand out from the others in margin, force or opener resistance. */
  rowsStandingOut: number[];
  /** What this log or machine would have to tell for a fuller verdict, in plain words. */
  missing: string[];
  /** Share of readings where opener resistance is only a lower bound; null where it is unknown. */
  resistanceCensoredShare: number | null;
  thresholds: typeof VERDICT_THRESHOLDS;
}

export interface VerdictOptions {
  distances?: Float32Array;
  /** Row statistics already worked out, by channel, to save doing them twice. */
  statistics?: ReadonlyMap<string, RowStatistics>;
}

const ORDER: Record<Finding["severity"], number> = { act: 0, look: 1, ok: 2 };
/** Doubt about the readings comes before all; then, within a severity: what is wrong with named rows, then with the machine, then what cannot be said. */
const KIND_ORDER: Finding["kind"][] = [
  "readings-doubtful",
  "row-stands-out",
  "rows-under-target",
  "weight-short",
  "contact-lost",
  "rows-side-by-side",
  "rows-some-passes",
  "rows-at-limit",
  "target-held",
  "rows-alike",
  "weight-enough",
  "over-target",
  "wheel-tracks",
  "cannot-judge",
  "weight-unknown",
  "not-a-seeding-log",
];

/** What can be said about a log at once: which rows, which weight, what to look at, and what the log cannot tell. */
export function passVerdict(placed: PlacedLog, options: VerdictOptions = {}): PassVerdict {
  if (placed.log.kind === "harvest") return harvestVerdict();
  const given = gatherEvidence(placed, options);
  const { findings: doubts, judged: input } = doubtReadings(given);
  const odd = findOddRows(input);
  const missing = missingInputs(given);
  const findings = [
    ...doubts,
    ...odd,
    ...sayAlike(input, odd),
    ...findUnderTarget(input),
    ...findAtLimit(input),
    ...findContactLost(input),
    ...findOverTarget(input),
    ...(given.downforce && !input.downforce ? [] : findWeight(input)),
    ...sayMissing(missing),
  ].sort((a, b) => rank(a) - rank(b) || size(b) - size(a));
  const { headroomN, shareLiftedM2, state, liftOffForcePerRowN } = input.balance;
  return {
    rowsUnderTarget: rowsFrom(input.margin, "shareUnderTarget", VERDICT_THRESHOLDS.underTargetShare).rows,
    rowsAtLimit: rowsFrom(input.downforce, "shareAtLimit", VERDICT_THRESHOLDS.atLimitShare).rows,
    known: {
      underTarget: input.margin !== null && underTargetBelowN(placed, input.margin.channel) !== null,
      atLimit: input.downforce !== null && atLimitFromN(placed, input.downforce.channel) !== null,
    },
    weight: { headroomN, shareLiftedM2, state, missing: input.balance.missing, liftOffForcePerRowN },
    findings,
    headline: chooseHeadline(findings),
    rowsStandingOut: odd.flatMap((one) => (one.kind === "row-stands-out" ? one.rows : [])).sort((a, b) => a - b),
    missing,
    resistanceCensoredShare: input.resistance?.channel.censoredShare ?? null,
    thresholds: VERDICT_THRESHOLDS,
  };
}

/** A harvest log sowed nothing: one sentence says so, and nothing is known about rows or weight. */
function harvestVerdict(): PassVerdict {
  const finding = makeFinding({
    kind: "not-a-seeding-log",
    severity: "ok",
    sentenceTemplate: "This is a harvest log; seeding verdicts do not apply.",
    method: "The kind of the log.",
    check: "",
  });
  return {
    rowsUnderTarget: [],
    rowsAtLimit: [],
    known: { underTarget: false, atLimit: false },
    weight: { headroomN: null, shareLiftedM2: null, state: "unknown", missing: [], liftOffForcePerRowN: null },
    findings: [finding],
    headline: [finding.id],
    rowsStandingOut: [],
    missing: [],
    resistanceCensoredShare: null,
    thresholds: VERDICT_THRESHOLDS,
  };
}

function gatherEvidence(placed: PlacedLog, options: VerdictOptions): VerdictInput {
  const distances = options.distances ?? rowDistances(placed);
  const given = { ...options, distances };
  const margin = channelEvidence(placed, "margin", given);
  return {
    placed,
    distances,
    margin,
    downforce: channelEvidence(placed, "downforce", given),
    resistance: channelEvidence(placed, "resistance", given),
    contact: channelEvidence(placed, "contact", given),
    balance: doubtBalance(measureFrameBalance(placed, distances), margin),
  };
}

function rank({ kind, severity }: Finding): number {
  const first = kind === "readings-doubtful" ? -1 : ORDER[severity];
  return first * KIND_ORDER.length + KIND_ORDER.indexOf(kind);
}

function size(finding: Finding): number {
  return Math.abs(finding.value ?? 0);
}

/** At most three, each of another kind. */
function chooseHeadline(findings: Finding[]): string[] {
  const firstOfKind = findings.filter((one, k) => findings.findIndex((other) => other.kind === one.kind) === k);
  return firstOfKind.slice(0, 3).map((one) => one.id);
}

/** What the minimum inputs of each statement lack, in plain words. */
function missingInputs({ placed, margin, downforce, contact }: VerdictInput): string[] {
  const { machine, log, passes } = placed;
  const perRow = margin ?? downforce ?? contact;
  const averaged = log.channels.some((channel) => ["margin", "downforce", "contact"].includes(channel.id));
  return [
    ...(perRow
      ? []
      : [
          averaged
            ? "The file is row-averaged: rows cannot be ranked."
            : "The log has no force, margin or contact of each row: rows cannot be judged.",
        ]),
    ...(perRow && log.rows < MIN_ROWS_TO_RANK
      ? [`With ${log.rows} rows none can be ranked; it needs ${MIN_ROWS_TO_RANK}.`]
      : []),
    ...(perRow && passes.length < VERDICT_THRESHOLDS.minPassesToRank
      ? [
          `With ${passes.length} ${passes.length === 1 ? "pass" : "passes"} a row cannot be told from the ground it ran on; it needs ${VERDICT_THRESHOLDS.minPassesToRank}.`,
        ]
      : []),
    ...(machine ? [] : ["Nobody has said which machine made the log: its target, limits and weights are unknown."]),
    ...(machine && margin && machine.targetMarginN === undefined
      ? ["The machine has no target margin: rows under target cannot be named."]
      : []),
    ...(machine && downforce && machine.maxDownforceN === undefined
      ? ["The machine has no force limit: rows at their limit cannot be named."]
      : []),
  ];
}

function sayMissing(missing: string[]): Finding[] {
  if (missing.length === 0) return [];
  return [
    makeFinding({
      kind: "cannot-judge",
      severity: "look",
      sentenceTemplate: missing.join(" "),
      confidence: "low",
      method: "Compared with the least that each statement needs.",
      check: "Complete the machine's description, or log force and margin for each row.",
    }),
  ];
}

/** Says that no row stands out, where rows could be ranked at all. */
function sayAlike({ margin, downforce, resistance, placed }: VerdictInput, odd: Finding[]): Finding[] {
  const ranked = [margin, downforce, resistance].filter((one) =>
    one?.statistics.items.some((item) => item.deviationZ !== null),
  );
  const blamed = odd.some((one) => one.kind !== "wheel-tracks");
  if (ranked.length === 0 || blamed || placed.passes.length < VERDICT_THRESHOLDS.minPassesToRank) return [];
  return [
    makeFinding({
      kind: "rows-alike",
      severity: "ok",
      sentenceTemplate: "No row stands out from the others.",
      method: "Robust z of each row against the others at each record; limit 3.5 and 5 % of the median of all rows.",
      check: "Nothing to look at on single rows.",
    }),
  ];
}
