import { CLEANING_CODES, ruleFacts, type CleaningCode, type CleaningRules } from "@/lib/cleaning/rule-catalogue";

/** A rule as the screens hold it: switch and numbers under their names. */
export type RuleDraft = { on: boolean } & Record<string, number | boolean>;
/** Numbers that do not make sense, by rule and name. */
export type DraftProblems = Partial<Record<CleaningCode, Record<string, string>>>;

export function ruleOf(rules: CleaningRules, code: CleaningCode): RuleDraft {
  return rules[code];
}

/** The same rules with one of them changed. */
export function changeRule(rules: CleaningRules, code: CleaningCode, change: Partial<RuleDraft>): CleaningRules {
  return { ...rules, [code]: { ...rules[code], ...change } };
}

/** Rules that differ, in order. */
export function changedCodes(before: CleaningRules, after: CleaningRules): CleaningCode[] {
  return CLEANING_CODES.filter((code) => {
    const [was, is] = [ruleOf(before, code), ruleOf(after, code)];
    return Object.keys(was).some((name) => was[name] !== is[name]);
  });
}

/** Numbers outside what their rule allows, in words. `say` writes a limit in the person's units. */
export function checkDraft(
  rules: CleaningRules,
  say: (value: number, code: CleaningCode, name: string) => string,
): DraftProblems {
  const problems: DraftProblems = {};
  for (const code of CLEANING_CODES) {
    const found: Record<string, string> = {};
    for (const [name, facts] of Object.entries(ruleFacts(code).numbers)) {
      const value = ruleOf(rules, code)[name];
      if (typeof value !== "number" || !Number.isFinite(value)) found[name] = "Enter a number.";
      else if (value < facts.minimum) found[name] = `At least ${say(facts.minimum, code, name)}.`;
      else if (value > facts.maximum) found[name] = `At most ${say(facts.maximum, code, name)}.`;
      else if (facts.whole && !Number.isInteger(value)) found[name] = "A whole number.";
    }
    if (Object.keys(found).length > 0) problems[code] = found;
  }
  return problems;
}

/** "Turning and Speed": what a change is about. */
export function nameRules(codes: readonly CleaningCode[]): string {
  const names = codes.map((code) => ruleFacts(code).label);
  if (names.length < 2) return names[0] ?? "";
  return `${names.slice(0, -1).join(", ")} and ${names.at(-1)}`;
}
