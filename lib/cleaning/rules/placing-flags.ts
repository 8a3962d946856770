import { FLAGS } from "@/lib/cleaning/flags";
import type { RuleInput, RuleMask } from "@/lib/cleaning/rule-mask";

/** Records without a place for their rows that did not lose it by an impossible step. */
export function findNoPosition({ placed }: RuleInput): RuleMask {
  const { flags, originEastM } = placed;
  const records = new Uint8Array(placed.log.records);
  for (let i = 0; i < records.length; i++) {
    const isLost = (flags[i]! & FLAGS["impossible-step"]) === 0 && !Number.isFinite(originEastM[i]!);
    if ((flags[i]! & FLAGS["no-position"]) !== 0 || isLost) records[i] = 1;
  }
  return { records };
}

/** Records whose position was marked as out of reach when the log was placed. */
export function findImpossibleSteps(input: RuleInput): RuleMask {
  return { records: recordsWith(input, FLAGS["impossible-step"]) };
}

/** Records that were logged with the machine not working. */
export function findNotWorking(input: RuleInput): RuleMask {
  return { records: recordsWith(input, FLAGS["not-working"]) };
}

/** Working records with the time of the record before, or an earlier one. */
export function findRepeatedTimes(input: RuleInput): RuleMask {
  const records = recordsWith(input, FLAGS["duplicate-time"] | FLAGS["time-backwards"]);
  for (let i = 0; i < records.length; i++) if (input.placed.passOf[i] === 0) records[i] = 0;
  return { records };
}

function recordsWith({ placed }: RuleInput, bits: number): Uint8Array {
  const records = new Uint8Array(placed.log.records);
  for (let i = 0; i < records.length; i++) if ((placed.flags[i]! & bits) !== 0) records[i] = 1;
  return records;
}
