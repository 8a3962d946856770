import {
  CLEANING_CODES,
  ruleFacts,
  ruleNumber,
  type CleaningCode,
  type CleaningRules,
} from "@/lib/cleaning/rule-catalogue";
import { CleaningRulesBody, type Cleaning, type CleaningEffect, type CleaningItem } from "@/lib/schemas/cleaning";

/** Rules as every log begins with them, read by the very schema of the API. */
export function startingRules(): CleaningRules {
  const entries = CLEANING_CODES.map((code) => {
    const { on, numbers } = ruleFacts(code);
    const standards = Object.entries(numbers).map(([name, { standard }]) => [name, standard] as const);
    return [code, { on, ...Object.fromEntries(standards) }] as const;
  });
  return CleaningRulesBody.parse(Object.fromEntries(entries));
}

/** Readings each rule would take out of the 10,000 of the log. */
const TAKEN: Partial<Record<CleaningCode, number>> = { turning: 600, speed: 1, "local-outlier": 40 };

function itemOf(code: CleaningCode, rules: CleaningRules, before: number): CleaningItem {
  const facts = ruleFacts(code);
  const rule: Record<string, number | boolean> = rules[code];
  const readings = TAKEN[code] ?? 0;
  const first = rules[code].on ? readings : 0;
  return {
    code,
    number: ruleNumber(code),
    label: facts.label,
    words: facts.words,
    on: rules[code].on,
    fixed: facts.fixed,
    parameters: Object.entries(facts.numbers).map(([name, number]) => ({
      name,
      label: number.label,
      unit: number.unit,
      value: Number(rule[name]),
      standard: number.standard,
      minimum: number.minimum,
      maximum: number.maximum,
      whole: number.whole ?? false,
      channel: number.channel ?? null,
    })),
    level: facts.level,
    records: Math.ceil(readings / 8),
    readings,
    share: readings / 10_000,
    takenOutFirst: first,
    before: { readings: before },
    after: { readings: before - first },
  };
}

function effectOf(kept: number): CleaningEffect {
  const asLogged = { n: 10_000, mean: 400, sd: 90, p05: 200, p50: 405, p95: 520, shareUnderTarget: 0.12 };
  const cleaned = kept === 10_000 ? asLogged : { ...asLogged, n: kept, mean: 410, shareUnderTarget: 0.1 };
  return { channel: "margin", unit: "N", asLogged, cleaned };
}

/** What the API says of a log with these rules. */
export function countCleaning(rules: CleaningRules): Pick<Cleaning, "rules" | "items" | "effect" | "total"> {
  let left = 10_000;
  const items = CLEANING_CODES.map((code) => {
    const item = itemOf(code, rules, left);
    left = item.after.readings;
    return item;
  });
  return { rules, items, effect: [effectOf(left)], total: { logged: 10_400, before: 10_000, after: left } };
}

export function makeCleaning(change: Partial<Cleaning> = {}): Cleaning {
  return { revision: 0, delaysS: {}, history: [], ...countCleaning(change.rules ?? startingRules()), ...change };
}
