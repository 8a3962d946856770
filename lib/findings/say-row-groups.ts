import { CAUTIONS } from "@/lib/findings/cautions";
import type { Finding } from "@/lib/findings/finding";
import { makeFinding, sayRows, startSentence } from "@/lib/findings/make-finding";
import { wholeRowPlace } from "@/lib/findings/place-lines";
import type { ChannelEvidence, RowStep } from "@/lib/findings/row-evidence";
import type { VerdictInput } from "@/lib/findings/verdict-input";
import { median } from "@/lib/statistics/median";

export const ODD_ROW_METHOD =
  "Robust z of the row's distance-weighted median deviation from the median of the other rows at each record " +
  "(Iglewicz & Hoaglin 1993, limit 3.5) and more than 5 % of the median of all rows; interval by bootstrap over passes.";

const PASS_AT_AN_ANGLE =
  "Drill one pass at an angle of 10 to 30 degrees, or shifted by half a width: what stays with the rows is the machine's.";

/** How to speak of several rows, by channel. */
interface GroupWords {
  below: string;
  above: string;
  quantity: string;
}

const RESISTANCE_WORDS: GroupWords = {
  below: "needed about {difference} less to open the furrow than the others",
  above: "needed about {difference} more to open the furrow than the others",
  quantity: "opener resistance",
};
const GROUP_WORDS: Record<string, GroupWords> = {
  margin: {
    below: "carried about {difference} less on the gauge wheel than the others",
    above: "carried about {difference} more on the gauge wheel than the others",
    quantity: "margin",
  },
  downforce: {
    below: "needed about {difference} less applied force than the others",
    above: "needed about {difference} more applied force than the others",
    quantity: "applied force",
  },
  resistance: RESISTANCE_WORDS,
};

function wordsOf({ statistics }: ChannelEvidence): GroupWords {
  return GROUP_WORDS[statistics.channel] ?? RESISTANCE_WORDS;
}

/** Rows side by side need not be the rows' own fault. `rows` leaves out those that have a finding of their own. */
export function saySideBySide(input: VerdictInput, evidence: ChannelEvidence, rows: number[]): Finding {
  const deviations = rows.map((row) => evidence.statistics.deviations[row - 1]!);
  const typical = median(deviations);
  const words = wordsOf(evidence);
  const isAlike = deviations.every((value) => value * typical > 0);
  const mixed = `${rows.length === 1 ? "differs" : "differ"} from the others in ${words.quantity} by about {difference}, either way`;
  const did = isAlike ? (typical < 0 ? words.below : words.above) : mixed;
  return makeFinding({
    kind: "rows-side-by-side",
    severity: "look",
    sentenceTemplate:
      `${startSentence(sayRows(rows))} ${did}, side by side: a band of residue, a ` +
      "wheel track or the rows themselves. This log cannot tell which.",
    values: {
      difference: { value: median(deviations.map((value) => Math.abs(value))), unit: evidence.channel.unit },
    },
    value: typical,
    unit: evidence.channel.unit,
    confidence: "low",
    method: `${ODD_ROW_METHOD} The number is the median of the rows named.`,
    place: wholeRowPlace(input.placed, rows[rows.length >> 1]!),
    check: PASS_AT_AN_ANGLE,
    rows,
  });
}

/** Rows beyond the limits over the whole log, yet not on nearly every pass: the ground may have done it. */
export function saySomePasses(evidence: ChannelEvidence, rows: number[], steps: Map<number, RowStep>): Finding[] {
  const largest = rows.map((row) => steps.get(row)!).sort((a, b) => Math.abs(b.deviation) - Math.abs(a.deviation))[0];
  if (!largest) return [];
  return [
    makeFinding({
      kind: "rows-some-passes",
      severity: "look",
      sentenceTemplate:
        `${startSentence(sayRows(rows))} ${rows.length === 1 ? "differs" : "differ"} from the others in ${wordsOf(evidence).quantity} by up to {difference}, but on ` +
        "some passes only: consistent with the ground met there, such as residue lying along the passes. This log cannot blame the rows.",
      values: { difference: { value: Math.abs(largest.deviation), unit: evidence.channel.unit } },
      value: largest.deviation,
      unit: evidence.channel.unit,
      confidence: "low",
      method: `${ODD_ROW_METHOD} A row is held to it where three quarters of the passes show at least 0.4 of the deviation.`,
      check: PASS_AT_AN_ANGLE,
      rows,
    }),
  ];
}

/** One remark for rows that stand out alike on both sides on nearly every pass; they are not held against the rows. */
export function sayWheelTracks(evidence: ChannelEvidence, steps: Map<number, RowStep>): Finding[] {
  const rows = tracksThatMatter(evidence);
  if (rows.length === 0 || rows.some((row) => !steps.get(row)!.constant)) return [];
  const typical = rows.reduce((sum, row) => sum + steps.get(row)!.deviation, 0) / rows.length;
  return [
    makeFinding({
      kind: "wheel-tracks",
      severity: "look",
      sentenceTemplate: `${startSentence(sayRows(rows))} differ alike in ${wordsOf(evidence).quantity} on both sides of the machine, by {difference}: consistent with wheel tracks.`,
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
export function tracksThatMatter({ statistics }: ChannelEvidence): number[] {
  const least = 0.05 * Math.abs(statistics.medianOfRows);
  return statistics.wheelTrackRows.filter((row) => Math.abs(statistics.deviations[row - 1]!) > least);
}
