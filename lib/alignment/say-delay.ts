import { DELAY_SETTINGS as SET } from "@/lib/alignment/delay-settings";
import type { DelayEstimate } from "@/lib/alignment/estimate-delay";
import type { DelayRefusal } from "@/lib/schemas/alignment";

const REASONS: Record<DelayRefusal, string> = {
  "no-times": "The log has no times, so no delay can be told from it.",
  "few-pairs":
    `A delay shows between neighbouring straight passes driven in opposite directions. This log has fewer than ` +
    `${SET.leastPairs} such pairs.`,
  "one-sided-pairs":
    "Nearly all opposite neighbours lie on the same side, so a pattern that lies askew cannot be told from a delay.",
  "nothing-varies": "The readings do not vary, so no delay shows in them.",
  flat: "Neighbouring passes agree no better at one delay than at another: too little of the field shows in this channel.",
  "at-the-edge":
    `The passes agree best at the edge of the delays tried (${SET.leastDelayS} to ${SET.mostDelayS} s), so the true one ` +
    "may lie beyond.",
  mirrored:
    "This channel changes its sign with the direction of travel, as one does that a controller holds at a target: it " +
    "answers changes of the ground, not the ground, and its delay cannot be told this way.",
  "two-answers": "Two different delays fit about as well, as they do where the ground repeats itself along the passes.",
  "too-wide": `The delay could not be told to better than ${SET.widestIntervalS} s.`,
};

/** Why a delay is refused, in words; undefined where it was told. */
export function sayRefusal({ refusal }: Pick<DelayEstimate, "refusal">): string | undefined {
  return refusal === null ? undefined : REASONS[refusal];
}

/** How the answer was reached, in words. */
export function sayMethod({ share, usedPasses, pairs, leftOut, separable }: DelayEstimate): string {
  const rows =
    share === null || share === 1
      ? "all rows together"
      : `the ${share > 0.25 ? "third" : "sixth"} of the rows beside the neighbour`;
  return [
    `Each reading is moved back along its own track by a delay of ${SET.leastDelayS} to ${SET.mostDelayS} s, and ${rows} of`,
    `${pairs} pairs of neighbouring opposite passes (${usedPasses} passes) are compared: J is the mean squared difference,`,
    "offsets of rows and passes taken out; its least is refined by a parabola.",
    ...(leftOut > 0 ? [`${leftOut} passes were left out, evenly, since the log is large.`] : []),
    separable
      ? "Speeds differ enough to tell a delay from a distance: both were fitted at once."
      : "Speeds differ too little to tell a delay from a distance: all of the shift is given as a delay.",
    `Intervals: 95 %, pairs drawn again ${SET.resamples} times in runs of two, widened by Student's t.`,
    "The time in which the machine itself answers the ground is part of the delay.",
  ].join(" ");
}
