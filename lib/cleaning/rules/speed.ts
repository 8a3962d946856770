import type { CleaningRule } from "@/lib/cleaning/rule-catalogue";
import { passMembers, type RuleInput, type RuleMask } from "@/lib/cleaning/rule-mask";

/**
 * Records slower than `minMps`, faster than `maxMps`, or whose speed changed since the record before in the pass by more
 * than `maxAccelerationMps2` allows. A record whose speed is not known is kept.
 */
export function findOddSpeeds({ placed }: RuleInput, rule: CleaningRule<"speed">): RuleMask {
  const records = new Uint8Array(placed.log.records);
  const { speedMps } = placed;
  for (const pass of placed.passes) {
    let before = -1;
    for (const record of passMembers(placed, pass)) {
      const speed = speedMps[record]!;
      if (Number.isNaN(speed)) continue;
      const seconds = before < 0 ? NaN : (placed.log.timeMs[record]! - placed.log.timeMs[before]!) / 1000;
      const change = seconds > 0 ? Math.abs(speed - speedMps[before]!) / seconds : 0;
      if (speed < rule.minMps || speed > rule.maxMps || change > rule.maxAccelerationMps2) records[record] = 1;
      before = record;
    }
  }
  return { records };
}
