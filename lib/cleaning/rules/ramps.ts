import type { CleaningRule } from "@/lib/cleaning/rule-catalogue";
import { passMembers, type RuleInput, type RuleMask } from "@/lib/cleaning/rule-mask";

type Ramp = Pick<CleaningRule<"start-ramp">, "distanceM" | "timeS">;

/** Records less than `distanceM` or less than `timeS` after the first of their pass. */
export function findStartRamps(input: RuleInput, ramp: Ramp): RuleMask {
  return { records: markRamps(input, ramp, "start") };
}

/** Records less than `distanceM` or less than `timeS` before the last of their pass. */
export function findEndRamps(input: RuleInput, ramp: Ramp): RuleMask {
  return { records: markRamps(input, ramp, "end") };
}

function markRamps({ placed, alongM }: RuleInput, ramp: Ramp, at: "start" | "end"): Uint8Array {
  const records = new Uint8Array(placed.log.records);
  const { timeMs } = placed.log;
  for (const pass of placed.passes) {
    const members = passMembers(placed, pass);
    const edge = at === "start" ? members[0] : members.at(-1);
    if (edge === undefined) continue;
    for (const record of members) {
      const metres = Math.abs(alongM[record]! - alongM[edge]!);
      const seconds = Math.abs(timeMs[record]! - timeMs[edge]!) / 1000;
      if (metres < ramp.distanceM || seconds < ramp.timeS) records[record] = 1;
    }
  }
  return records;
}
