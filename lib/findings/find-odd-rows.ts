import { CAUTIONS } from "@/lib/findings/cautions";
import type { Finding } from "@/lib/findings/finding";
import { makeFinding, sayRows, startSentence } from "@/lib/findings/make-finding";
import { passInterval } from "@/lib/findings/pass-interval";
import { stretchPlace, wholeRowPlace } from "@/lib/findings/place-lines";
import { rowSteps, type ChannelEvidence, type RowStep } from "@/lib/findings/row-evidence";
import { VERDICT_THRESHOLDS, type VerdictInput } from "@/lib/findings/verdict-input";
import { rowSeries } from "@/lib/statistics/row-series";
import { longestStretch, underTargetBelowN } from "@/lib/statistics/row-shares";

const METHOD =
  "Robust z of the row's distance-weighted median deviation from the median of the other rows at each record " +
  "(Iglewicz & Hoaglin 1993, limit 3.5) and more than 5 % of the median of all rows; interval by bootstrap over passes.";

/**
 * Rows that stand out from the rest: one finding a row; one for rows side by side, or that differ on some passes only, which
 * need not be the rows' fault; and a remark on wheel tracks.
 */
export function findOddRows(input: VerdictInput): Finding[] {
  const evidence = [input.margin, input.downforce, input.resistance].filter((one) => one !== null);
  const said = new Set<number>();
  const findings = evidence.flatMap((one) => {
    const flagged = one.statistics.items.filter((item) => item.flagged).map((item) => item.row);
    const steps = rowSteps(input, one, [...flagged, ...tracksThatMatter(one)]);
    const unsaid = (rows: number[]) => rows.filter((row) => !said.has(row));
    const runs = sideBySide(flagged);
    const alone = unsaid(runs.filter((run) => run.length < SIDE_BY_SIDE).flat());
    const made = [
      ...alone
        .filter((row) => steps.get(row)!.constant)
        .map((row) => sayRow(input, one, { row, step: steps.get(row)! })),
      ...runs
        .filter((run) => run.length >= SIDE_BY_SIDE && unsaid(run).length > 0)
        .map((run) => sayRun(input, one, run)),
      ...saySomePasses(
        one,
        alone.filter((row) => !steps.get(row)!.constant),
        steps,
      ),
    ];
    for (const row of flagged) said.add(row);
    return [...made, ...sayWheelTracks(one, steps)];
  });
  return firstOfEach(findings, ["wheel-tracks", "rows-some-passes"]);
}

/** Keeps one finding of each of the given kinds: several channels tell the same tale. */
function firstOfEach(findings: Finding[], kinds: Finding["kind"][]): Finding[] {
  return findings.filter(
    (one, k) => !kinds.includes(one.kind) || findings.findIndex((other) => other.kind === one.kind) === k,
  );
}

const PASS_AT_AN_ANGLE =
  "Drill one pass at an angle of 10 to 30 degrees, or shifted by half a width: what stays with the rows is the machine's.";

/** As many rows differing side by side need not be the rows' own fault. */
const SIDE_BY_SIDE = 3;

/** Splits row numbers into runs of neighbours. */
function sideBySide(rows: number[]): number[][] {
  const runs: number[][] = [];
  for (const row of rows.sort((a, b) => a - b)) {
    const last = runs[runs.length - 1];
    if (last?.[last.length - 1] === row - 1) last.push(row);
    else runs.push([row]);
  }
  return runs;
}

const WORDING: Record<string, { below: string; above: string; check: string }> = {
  margin: {
    below: "Row {row} carried {difference} less on its gauge wheel than its neighbours on {share} of the distance.",
    above: "Row {row} carried {difference} more on its gauge wheel than its neighbours on {share} of the distance.",
    check: "Check its disc and bushing, its gauge wheel and arm, and that its margin sensor reads about 0 when raised.",
  },
  downforce: {
    below: "Row {row} was pushed down {difference} less than its neighbours on {share} of the distance.",
    above: "Row {row} was pushed down {difference} harder than its neighbours on {share} of the distance.",
    check:
      "Check its disc and bushing, its hose and cylinder, and compare its sensor with a neighbour's by swapping them.",
  },
  resistance: {
    below: "Row {row} needed {difference} less to open its furrow than its neighbours on {share} of the distance.",
    above: "Row {row} needed {difference} more to open its furrow than its neighbours on {share} of the distance.",
    check: "Check its disc, bushing and row cleaner, then dig behind it and behind a neighbour.",
  },
};

function sayRow(
  input: VerdictInput,
  evidence: ChannelEvidence,
  { row, step }: { row: number; step: RowStep },
): Finding {
  const words = WORDING[evidence.statistics.channel] ?? WORDING.resistance!;
  const fewPasses = input.placed.passes.length < VERDICT_THRESHOLDS.minPassesToRank;
  const large =
    Math.abs(step.deviation) >= VERDICT_THRESHOLDS.actDeviationShare * Math.abs(evidence.statistics.medianOfRows);
  const pushed = evidence.channel.id === "downforce" || evidence.channel.id === "resistance";
  const doubt = fewPasses ? " So few passes cannot tell the row from the ground it ran on." : "";
  return makeFinding({
    kind: "row-stands-out",
    severity: large && !fewPasses ? "act" : "look",
    sentenceTemplate: `${step.deviation < 0 ? words.below : words.above} ${shortCheck(words.check)}${doubt}`,
    values: {
      row: { value: row, unit: "1" },
      difference: { value: Math.abs(step.deviation), unit: evidence.channel.unit },
      share: { value: step.shareSameWay, unit: "fraction" },
    },
    value: step.deviation,
    unit: evidence.channel.unit,
    interval: intervalAbout(step.deviation, step.byPass),
    confidence: fewPasses ? "low" : input.placed.passes.length < 8 ? "medium" : "high",
    method: METHOD,
    place: worstPlace(input, row),
    check: `${words.check} A row that stands out everywhere is consistent with wear, a blockage or a sensor; this log cannot tell which.`,
    caution: pushed ? `${CAUTIONS.underMachine} ${CAUTIONS.hydraulics}` : CAUTIONS.underMachine,
    row,
  });
}

/** The spread of the passes, laid about the value itself. */
function intervalAbout(value: number, byPass: number[]): [number, number] | null {
  const interval = passInterval(byPass);
  if (!interval) return null;
  const mean = byPass.reduce((sum, each) => sum + each, 0) / byPass.length;
  return [value + interval[0] - mean, value + interval[1] - mean];
}

/** The first thing to look at, for the sentence: everything up to the first comma. */
function shortCheck(check: string): string {
  return `${check.split(",")[0]!}.`;
}

/** The longest stretch under target where there is one, else the row's whole line. */
function worstPlace({ placed, margin, distances }: VerdictInput, row: number): Finding["place"] {
  const below = margin && underTargetBelowN(placed, margin.channel);
  if (margin && below !== null && below !== undefined) {
    const series = rowSeries(placed, margin.channel, distances, row - 1);
    const place = stretchPlace(
      placed,
      row,
      longestStretch(placed, series, (value) => value < below),
    );
    if (place) return place;
  }
  return wholeRowPlace(placed, row);
}

function sayRun(input: VerdictInput, evidence: ChannelEvidence, rows: number[]): Finding {
  const deviations = rows.map((row) => evidence.statistics.deviations[row - 1]!);
  const largest = deviations.reduce((most, value) => (Math.abs(value) > Math.abs(most) ? value : most), 0);
  return makeFinding({
    kind: "rows-side-by-side",
    severity: "look",
    sentenceTemplate:
      `${startSentence(sayRows(rows))} differ from the others side by side, by up to {difference}: a band of residue, a ` +
      "wheel track or the rows themselves. This log cannot tell which.",
    values: { difference: { value: Math.abs(largest), unit: evidence.channel.unit } },
    value: largest,
    unit: evidence.channel.unit,
    confidence: "low",
    method: METHOD,
    place: wholeRowPlace(input.placed, rows[rows.length >> 1]!),
    check: PASS_AT_AN_ANGLE,
    rows,
  });
}

/** Rows beyond the limits over the whole log, yet not on nearly every pass: the ground may have done it. */
function saySomePasses(evidence: ChannelEvidence, rows: number[], steps: Map<number, RowStep>): Finding[] {
  const largest = rows.map((row) => steps.get(row)!).sort((a, b) => Math.abs(b.deviation) - Math.abs(a.deviation))[0];
  if (!largest) return [];
  return [
    makeFinding({
      kind: "rows-some-passes",
      severity: "look",
      sentenceTemplate:
        `${startSentence(sayRows(rows))} ${rows.length === 1 ? "differs" : "differ"} from the others by up to {difference}, but on ` +
        "some passes only: consistent with the ground met there, such as residue lying along the passes. This log cannot blame the rows.",
      values: { difference: { value: Math.abs(largest.deviation), unit: evidence.channel.unit } },
      value: largest.deviation,
      unit: evidence.channel.unit,
      confidence: "low",
      method: `${METHOD} A row is held to it where three quarters of the passes show at least 0.4 of the deviation.`,
      check: PASS_AT_AN_ANGLE,
      rows,
    }),
  ];
}

/** One remark for rows that stand out alike on both sides on nearly every pass; they are not held against the rows. */
function sayWheelTracks(evidence: ChannelEvidence, steps: Map<number, RowStep>): Finding[] {
  const rows = tracksThatMatter(evidence);
  if (rows.length === 0 || rows.some((row) => !steps.get(row)!.constant)) return [];
  const typical = rows.reduce((sum, row) => sum + steps.get(row)!.deviation, 0) / rows.length;
  return [
    makeFinding({
      kind: "wheel-tracks",
      severity: "look",
      sentenceTemplate: `${startSentence(sayRows(rows))} differ alike on both sides of the machine, by {difference}: consistent with wheel tracks.`,
      values: { difference: { value: Math.abs(typical), unit: evidence.channel.unit } },
      value: typical,
      unit: evidence.channel.unit,
      confidence: "medium",
      method:
        "Rows beyond a robust z of 3.5 whose mirror row about the centre line differs the same way, by at least half as much, on nearly every pass.",
      check:
        "Compare the ground behind those rows with the ground between: firmness and depth. Residue lying along the passes could look the same.",
      caution: CAUTIONS.digging,
      rows,
    }),
  ];
}

/** Wheel-track rows whose step is more than 5 % of the median row: smaller ones are in the line-up, not in the verdict. */
function tracksThatMatter({ statistics }: ChannelEvidence): number[] {
  const least = 0.05 * Math.abs(statistics.medianOfRows);
  return statistics.wheelTrackRows.filter((row) => Math.abs(statistics.deviations[row - 1]!) > least);
}
