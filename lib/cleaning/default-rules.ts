import { CLEANING_CODES, CLEANING_RULES, ruleFacts, type CleaningRules } from "@/lib/cleaning/rule-catalogue";

/** The rules before anybody chose: what places need is on, all else off with its usual numbers. */
export function defaultRules(): CleaningRules {
  const rules = CLEANING_CODES.map((code) => {
    const { on, numbers } = ruleFacts(code);
    const standard = Object.entries(numbers).map(([name, facts]) => [name, facts.standard] as const);
    return [code, { on, ...Object.fromEntries(standard) }] as const;
  });
  // Made from every entry of the catalogue that the type is made from.
  return Object.fromEntries(rules) as unknown as CleaningRules;
}

/** Codes of rules that take out readings which without them would count: those that are on and can be switched. */
export function chosenRules(rules: CleaningRules): (keyof typeof CLEANING_RULES)[] {
  return CLEANING_CODES.filter((code) => rules[code].on && ruleFacts(code).fixed === null);
}
