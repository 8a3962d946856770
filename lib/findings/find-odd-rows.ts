import { CAUTIONS } from "@/lib/findings/cautions";
import type { Finding } from "@/lib/findings/finding";
import { makeFinding } from "@/lib/findings/make-finding";
import { passInterval } from "@/lib/findings/pass-interval";
import { stretchPlace, wholeRowPlace } from "@/lib/findings/place-lines";
import { rowSteps, type ChannelEvidence, type RowStep } from "@/lib/findings/row-evidence";
import {
  ODD_ROW_METHOD,
  saySideBySide,
  saySomePasses,
  sayWheelTracks,
  tracksThatMatter,
} from "@/lib/findings/say-row-groups";
import { VERDICT_THRESHOLDS, type VerdictInput } from "@/lib/findings/verdict-input";
import { rowSeries } from "@/lib/statistics/row-series";
import { longestStretch, underTargetBelowN } from "@/lib/statistics/row-shares";

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
        .map((run) => saySideBySide(input, one, unsaid(run))),
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

interface RowWords {
  below: string;
  above: string;
  /** What of the row may be at fault. */
  parts: string;
  check: string;
}

const WORDING: Record<string, RowWords> = {
  margin: {
    below: "Row {row} carried {difference} less on its gauge wheel than the other rows on {share} of the distance.",
    above: "Row {row} carried {difference} more on its gauge wheel than the other rows on {share} of the distance.",
    parts: "disc, bushing, gauge wheel and sensor",
    check: "Check its disc, bushing, gauge wheel and arm, and that its margin sensor reads about 0 when raised.",
  },
  downforce: {
    below: "Row {row} was pushed down {difference} less than the other rows on {share} of the distance.",
    above: "Row {row} was pushed down {difference} harder than the other rows on {share} of the distance.",
    parts: "disc, bushing, cylinder and sensor",
    check: "Check its disc, bushing, hose and cylinder, and compare its sensor with a neighbour's by swapping them.",
  },
  resistance: {
    below: "Row {row} needed {difference} less to open its furrow than the other rows on {share} of the distance.",
    above: "Row {row} needed {difference} more to open its furrow than the other rows on {share} of the distance.",
    parts: "disc, bushing and row cleaner",
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
    sentenceTemplate: `${step.deviation < 0 ? words.below : words.above} Check its ${words.parts}: which of them, this log cannot tell.${doubt}`,
    values: {
      row: { value: row, unit: "1" },
      difference: { value: Math.abs(step.deviation), unit: evidence.channel.unit },
      share: { value: step.shareSameWay, unit: "fraction" },
    },
    value: step.deviation,
    unit: evidence.channel.unit,
    interval: intervalAbout(step.deviation, step.byPass),
    confidence: fewPasses ? "low" : input.placed.passes.length < 8 ? "medium" : "high",
    method: ODD_ROW_METHOD,
    place: worstPlace(input, row),
    check: words.check,
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
