import type { Finding } from "@/lib/findings/finding";
import { makeFinding } from "@/lib/findings/make-finding";
import type { ChannelEvidence } from "@/lib/findings/row-evidence";
import type { VerdictInput } from "@/lib/findings/verdict-input";

/**
 * Readings this far beyond what the machine can do are in another unit, or not what the column was taken for. Factors and
 * share: common practice, no source.
 */
const DOUBT = { forceOverLimit: 1.2, forceShare: 0.05, marginOverTarget: 5 } as const;

/**
 * Channels that cannot be right for this machine: force above its limit on more of the distance than noise explains, and
 * margins many times the target. At most one finding, which asks about the unit; `judged` is the input without whatever
 * rests on those channels, so that nothing is concluded from them.
 */
export function doubtReadings(input: VerdictInput): { findings: Finding[]; judged: VerdictInput } {
  const force = timesForceLimit(input);
  const margin = timesTarget(input);
  if (force === null && margin === null) return { findings: [], judged: input };
  const sentences = [
    ...(force === null ? [] : [`Force readings reach ${force.toFixed(1)} times what this machine can apply.`]),
    ...(margin === null ? [] : [`Margin readings are typically ${margin.toFixed(1)} times this machine's target.`]),
  ];
  const finding = makeFinding({
    kind: "readings-doubtful",
    severity: "look",
    sentenceTemplate: `${sentences.join(" ")} Is the unit right?`,
    value: force ?? margin,
    method:
      `Force above ${DOUBT.forceOverLimit} times the machine's limit on more than ${100 * DOUBT.forceShare} % of the distance (told ` +
      `by the highest 95th percentile of a row), or a median margin over ${DOUBT.marginOverTarget} times the target. Nothing is ` +
      "concluded from such readings.",
    check: "Open the columns again and look at the unit.",
  });
  const judged = {
    ...input,
    margin: margin === null ? input.margin : null,
    downforce: force === null ? input.downforce : null,
    resistance: null,
    balance: force === null ? input.balance : unknownBalance(input),
  };
  return { findings: [finding], judged };
}

function unknownBalance({ balance }: VerdictInput): VerdictInput["balance"] {
  const nothing = { headroomN: null, shareLiftedM2: null, lifts: [] };
  return { ...balance, ...nothing, state: "unknown", missing: ["force readings that this machine can apply"] };
}

/** How many times the machine's limit the force reaches; null where that can be right, or no limit is known. */
function timesForceLimit({ placed, distances, downforce }: VerdictInput): number | null {
  const limitN = placed.machine?.maxDownforceN;
  if (!downforce || downforce.channel.unit !== "N" || limitN === undefined) return null;
  if (shareAbove(downforce, distances, DOUBT.forceOverLimit * limitN) <= DOUBT.forceShare) return null;
  return Math.max(...downforce.statistics.items.map((item) => item.p95 ?? 0)) / limitN;
}

function timesTarget({ placed, margin }: VerdictInput): number | null {
  const targetN = placed.machine?.targetMarginN;
  if (!margin || margin.channel.unit !== "N" || targetN === undefined) return null;
  const times = margin.statistics.medianOfRows / targetN;
  return times > DOUBT.marginOverTarget ? times : null;
}

/** Share of the distance of all rows with a reading above `limitN`. */
function shareAbove({ channel }: ChannelEvidence, distances: Float32Array, limitN: number): number {
  let above = 0;
  let total = 0;
  for (let at = 0; at < channel.values.length; at++) {
    const value = channel.values[at]!;
    if (Number.isNaN(value)) continue;
    total += distances[at]!;
    if (value > limitN) above += distances[at]!;
  }
  return total > 0 ? above / total : 0;
}
