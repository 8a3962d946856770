import { LRUCache } from "lru-cache";
import { findRuleMask } from "@/lib/cleaning/find-rule-mask";
import type { CleaningCode, CleaningRules } from "@/lib/cleaning/rule-catalogue";
import { distanceAlongPasses, type RuleInput, type RuleMask } from "@/lib/cleaning/rule-mask";
import type { PlacedLog } from "@/lib/logs/placed-log";

const KEPT_BYTES = 192 * 1024 * 1024;

const kept = new LRUCache<string, RuleMask>({ maxSize: KEPT_BYTES, sizeCalculation: bytesOf });

function bytesOf({ records, cells, whole, channels }: RuleMask): number {
  const arrays = [records, cells, whole, ...(channels?.values() ?? [])];
  return Math.max(
    1,
    arrays.reduce((sum, array) => sum + (array?.byteLength ?? 0), 0),
  );
}

/**
 * Masks of a log's rules, each worked out once for the same numbers: a rule judges the log as it was read, whatever the
 * others do, so that switching one touches no other. `logKey` names the version of the log and the delays of its channels.
 */
export function maskFinder(logKey: string, placed: PlacedLog, rules: CleaningRules): (code: CleaningCode) => RuleMask {
  let input: RuleInput | undefined;
  return (code) => {
    const numbers = { ...rules[code], on: undefined };
    const key = `${logKey} ${code} ${JSON.stringify(numbers)}`;
    const known = kept.get(key);
    if (known) return known;
    input ??= { placed, alongM: distanceAlongPasses(placed) };
    const mask = findRuleMask(code, input, rules[code]);
    kept.set(key, mask);
    return mask;
  };
}
