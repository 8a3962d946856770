import type { CleaningRule } from "@/lib/cleaning/rule-catalogue";
import { passMembers, type RuleInput, type RuleMask } from "@/lib/cleaning/rule-mask";

/** Records of passes under `minLengthM` or under `minRecords`. */
export function findShortPasses({ placed }: RuleInput, rule: CleaningRule<"short-pass">): RuleMask {
  const records = new Uint8Array(placed.log.records);
  for (const pass of placed.passes) {
    if (pass.lengthM >= rule.minLengthM && pass.records >= rule.minRecords) continue;
    for (const record of passMembers(placed, pass)) records[record] = 1;
  }
  return { records };
}
