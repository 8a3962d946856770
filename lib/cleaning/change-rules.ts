import { CLEANING_CODES, ruleFacts, type CleaningCode, type CleaningRules } from "@/lib/cleaning/rule-catalogue";
import { fail, succeed, type Result } from "@/lib/result";
import type { CleaningRulesChange } from "@/lib/schemas/cleaning";

/** A change that cannot be, by the path of what is wrong with it. */
export interface RuleFault {
  path: string;
  message: string;
}

/** The rules with what is changed of them; what is not named stays. Faults where a rule would make no sense. */
export function changeRules(now: CleaningRules, change: CleaningRulesChange): Result<CleaningRules, RuleFault[]> {
  const merged = CLEANING_CODES.map((code) => [code, { ...now[code], ...definedOf(change[code] ?? {}) }] as const);
  // Every code of the catalogue, each with what it had.
  const rules = Object.fromEntries(merged) as unknown as CleaningRules;
  const faults = [...CLEANING_CODES.flatMap((code) => fixedFault(code, rules)), ...orderFaults(rules)];
  return faults.length > 0 ? fail(faults) : succeed(rules);
}

function definedOf(rule: object): Record<string, unknown> {
  return Object.fromEntries(Object.entries(rule).filter(([, value]) => value !== undefined));
}

function fixedFault(code: CleaningCode, rules: CleaningRules): RuleFault[] {
  const { fixed, label } = ruleFacts(code);
  if (fixed === null || rules[code].on) return [];
  return [{ path: `rules.${code}.on`, message: `"${label}" cannot be switched off. ${fixed}` }];
}

/** Pairs of numbers of one rule, of which the first must be the smaller. */
function orderFaults(rules: CleaningRules): RuleFault[] {
  const pairs = [
    ["speed", "minMps", "maxMps"],
    ...Object.keys(ruleFacts("physical-range").numbers)
      .filter((name) => /^[a-zA-Z]+Min[A-Z]/.test(name))
      .map((name) => ["physical-range", name, name.replace(/Min(?=[A-Z])/, "Max")]),
  ] as [CleaningCode, string, string][];
  return pairs.flatMap(([code, least, greatest]) => {
    const rule = new Map<string, unknown>(Object.entries(rules[code]));
    if (Number(rule.get(least)) < Number(rule.get(greatest))) return [];
    return [{ path: `rules.${code}.${least}`, message: `must be less than ${greatest}` }];
  });
}
