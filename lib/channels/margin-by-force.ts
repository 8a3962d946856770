import { forceChannel } from "@/lib/channels/opener-resistance";
import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { fail, succeed, type Result } from "@/lib/result";
import { atLimitFromN, underTargetBelowN } from "@/lib/statistics/row-shares";

/**
 * What margin and force say together of one reading, as numbers from the most pressing on: where far out a pixel covers as much
 * of two, it shows the first.
 */
export const MARGIN_BY_FORCE = {
  /** Under target with the force at its limit: short of weight, or the ground asks too much. */
  shortOfWeight: 1,
  /** Under target with the force at nine tenths of its limit or more. */
  nearlyAtLimit: 2,
  /** Under target with force to spare: target, lag or a passive setting too low. */
  setTooLow: 3,
  inBand: 4,
  /** Over target while force is applied: the target is set higher than needed. */
  targetTooHigh: 5,
  /** Over target without any force applied: the unit's own weight is too much. */
  unitWeightTooMuch: 6,
} as const;

const CODES = Object.keys(MARGIN_BY_FORCE).length;

/** From this share of its limit on a force counts as near it. */
const NEAR_LIMIT_SHARE = 0.9;
/** Up to this share of the limit, or one step of the log's own rounding, a row unit counts as left to its own weight. */
const IDLE_SHARE = 0.01;

export interface ForceLevels {
  underBelowN: number;
  overAboveN: number;
  atLimitFromN: number;
  nearLimitFromN: number;
  idleUpToN: number;
}

/** The cross class of one reading; NaN where either number is missing. */
// kernel: one reading
export function marginByForceCode(marginN: number, forceN: number, levels: ForceLevels): number {
  if (Number.isNaN(marginN) || Number.isNaN(forceN)) return NaN;
  if (marginN < levels.underBelowN) {
    if (forceN >= levels.atLimitFromN) return MARGIN_BY_FORCE.shortOfWeight;
    return forceN >= levels.nearLimitFromN ? MARGIN_BY_FORCE.nearlyAtLimit : MARGIN_BY_FORCE.setTooLow;
  }
  if (marginN <= levels.overAboveN) return MARGIN_BY_FORCE.inBand;
  return forceN <= levels.idleUpToN ? MARGIN_BY_FORCE.unitWeightTooMuch : MARGIN_BY_FORCE.targetTooHigh;
}

function whatIsMissing({ machine }: PlacedLog, has: { downforce: boolean; margin: boolean }): string[] {
  return [
    ...(has.downforce ? [] : ["the force applied to each row (in newtons)"]),
    ...(has.margin ? [] : ["the margin of each row (in newtons)"]),
    ...(machine?.targetMarginN === undefined ? ["the machine's target margin"] : []),
    ...(machine?.marginDeadbandN === undefined ? ["how far off target still counts as on it"] : []),
    ...(machine?.maxDownforceN === undefined ? ["the machine's highest force"] : []),
  ];
}

/** Cross classes of every reading in passes; NaN where margin or force is missing, or the reading lies in no pass. */
export function marginByForce(placed: PlacedLog): Result<ResolvedChannel, string> {
  const downforce = forceChannel(placed, "downforce");
  const margin = forceChannel(placed, "margin");
  const missing = whatIsMissing(placed, { downforce: downforce !== null, margin: margin !== null });
  const { targetMarginN, marginDeadbandN, maxDownforceN } = placed.machine ?? {};
  if (!downforce || !margin || targetMarginN === undefined || marginDeadbandN === undefined || !maxDownforceN) {
    return fail(`Margin by force needs ${missing.join(" and ")}.`);
  }
  const levels: ForceLevels = {
    underBelowN: underTargetBelowN(placed, margin) ?? NaN,
    overAboveN: targetMarginN + marginDeadbandN,
    atLimitFromN: atLimitFromN(placed, downforce) ?? NaN,
    nearLimitFromN: NEAR_LIMIT_SHARE * maxDownforceN,
    idleUpToN: Math.max(IDLE_SHARE * maxDownforceN, downforce.resolution ?? 0),
  };
  const { rows } = margin;
  const values = new Float32Array(margin.values.length).fill(NaN);
  for (let record = 0; record < placed.log.records; record++) {
    if (placed.passOf[record] === 0) continue;
    for (let at = record * rows; at < (record + 1) * rows; at++) {
      values[at] = marginByForceCode(margin.values[at]!, downforce.values[at]!, levels);
    }
  }
  const named = { isCode: true, codeCount: CODES, resolution: 1, censoredShare: null } as const;
  return succeed({ id: "marginByForce", unit: "1", rows, perRow: true, values, ...named });
}
