import { CAUTIONS } from "@/lib/findings/cautions";
import type { Finding } from "@/lib/findings/finding";
import { makeFinding } from "@/lib/findings/make-finding";
import { stretchesPlace } from "@/lib/findings/place-lines";
import { rowsFrom, VERDICT_THRESHOLDS, type VerdictInput } from "@/lib/findings/verdict-input";

const METHOD =
  "Statics about the hitch pin: moments of frame and ballast less those of the row forces, over the distance of the wheels; " +
  "headroom is what is left above the least wheel load. A mounted hitch that pushes, and full or empty boxes, are not in it.";

/** Whether the frame was heavy enough for the force its rows asked for. */
export function findWeight(input: VerdictInput): Finding[] {
  const { balance } = input;
  if (balance.state === "unknown" || !balance.headroomN) return sayUnknown(input);
  return [balance.state === "short" ? sayShort(input, balance.headroomN) : sayEnough(balance.headroomN)];
}

function sayShort({ placed, balance }: VerdictInput, headroomN: { p05: number; p50: number }): Finding {
  const lifted = balance.shareLiftedM2 ?? 0;
  const liftedSentence =
    "On {share} of the area the rows pushed up as hard as the frame weighs, so its wheels carried next to nothing.";
  const leanSentence =
    "On the leanest twentieth of the area the frame's wheels were {short} or more under the least load they should keep.";
  return makeFinding({
    kind: "weight-short",
    severity: "act",
    sentenceTemplate: lifted >= 0.01 ? liftedSentence : leanSentence,
    values: {
      share: { value: lifted, unit: "fraction" },
      short: { value: Math.max(0, -headroomN.p05), unit: "N" },
      median: { value: headroomN.p50, unit: "N" },
    },
    value: headroomN.p05,
    unit: "N",
    method: METHOD,
    place: stretchesPlace(placed, Math.ceil(placed.geometry.rows / 2), balance.lifts),
    check:
      "Watch the frame's height while it runs there, and check the ballast against the manual and the dealer's advice.",
    caution: CAUTIONS.ballast,
  });
}

function sayEnough(headroomN: { p05: number; p50: number }): Finding {
  return makeFinding({
    kind: "weight-enough",
    severity: "ok",
    sentenceTemplate: "The frame was heavy enough: its wheels kept {spare} above the least load on 95 % of the area.",
    values: { spare: { value: headroomN.p05, unit: "N" } },
    value: headroomN.p05,
    unit: "N",
    method: METHOD,
    check: "Boxes get lighter as they empty: look again at the end of the field.",
  });
}

function sayUnknown(input: VerdictInput): Finding[] {
  const under = rowsFrom(input.margin, "shareUnderTarget", VERDICT_THRESHOLDS.underTargetShare).rows.length;
  const limit = rowsFrom(input.downforce, "shareAtLimit", VERDICT_THRESHOLDS.atLimitShare).rows.length;
  const half = input.placed.geometry.rows / 2;
  const together = under >= half && limit >= half;
  const hint = together
    ? " Half the rows or more were under target and at their force limit, which is consistent with too little weight."
    : "";
  return [
    makeFinding({
      kind: "weight-unknown",
      severity: "look",
      sentenceTemplate: `Whether the frame is heavy enough cannot be said: it would need ${input.balance.missing.join(", and ")}.${hint}`,
      confidence: "low",
      method: METHOD,
      check: sayCheck(input, together),
    }),
  ];
}

function sayCheck({ balance }: VerdictInput, together: boolean): string {
  if (balance.headroomN)
    return "Check that this log has the machine that made it, with its weights and ballast as they were.";
  return together
    ? "Watch the frame's height while it runs, and add its weights to the machine's description."
    : "Add the frame's weights and distances to the machine's description.";
}
