import type { CleaningCode, CleaningRules } from "@/lib/cleaning/rule-catalogue";
import type { RuleInput, RuleMask } from "@/lib/cleaning/rule-mask";
import { findLocalOutliers } from "@/lib/cleaning/rules/local-outlier";
import { findOverlaps } from "@/lib/cleaning/rules/overlap";
import { findBeyondRange } from "@/lib/cleaning/rules/physical-range";
import {
  findImpossibleSteps,
  findNoPosition,
  findNotWorking,
  findRepeatedTimes,
} from "@/lib/cleaning/rules/placing-flags";
import { findEndRamps, findStartRamps } from "@/lib/cleaning/rules/ramps";
import { findStuckSensors } from "@/lib/cleaning/rules/sensor-stuck";
import { findShortPasses } from "@/lib/cleaning/rules/short-pass";
import { findOddSpeeds } from "@/lib/cleaning/rules/speed";
import { findTurning } from "@/lib/cleaning/rules/turning";

type Finder<Code extends CleaningCode> = (input: RuleInput, rule: CleaningRules[Code]) => RuleMask;

const FINDERS: { [Code in CleaningCode]: Finder<Code> } = {
  "no-position": findNoPosition,
  "duplicate-time": findRepeatedTimes,
  "impossible-step": findImpossibleSteps,
  "not-working": findNotWorking,
  "start-ramp": findStartRamps,
  "end-ramp": findEndRamps,
  turning: findTurning,
  speed: findOddSpeeds,
  "sensor-stuck": findStuckSensors,
  "physical-range": findBeyondRange,
  "local-outlier": findLocalOutliers,
  "short-pass": findShortPasses,
  overlap: findOverlaps,
};

/** What a rule takes out, or would if it were on. */
export function findRuleMask<Code extends CleaningCode>(
  code: Code,
  input: RuleInput,
  rule: CleaningRules[Code],
): RuleMask {
  return FINDERS[code](input, rule);
}
