import { buildLog } from "@/lib/build/build-log";
import { defaultRules } from "@/lib/cleaning/default-rules";
import { findRuleMask } from "@/lib/cleaning/find-rule-mask";
import type { CleaningCode, CleaningRules } from "@/lib/cleaning/rule-catalogue";
import { distanceAlongPasses, type RuleMask } from "@/lib/cleaning/rule-mask";
import type { MachineLog } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { makeLog, makeSeeder, type MadeLog } from "@/tests/support/make-log";

/** A hand-made log on the ground; `edit` changes it before it is placed. */
export function makePlaced(made: MadeLog, edit: (log: MachineLog) => void = () => undefined): PlacedLog {
  const log = makeLog(made);
  edit(log);
  const built = buildLog(log, makeSeeder({ rowCount: made.rows ?? 4 }));
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

/** What a rule takes out of a log with these numbers; the usual ones where left out. */
export function maskOf<Code extends CleaningCode>(
  placed: PlacedLog,
  code: Code,
  numbers: Partial<CleaningRules[Code]> = {},
): RuleMask {
  const rule = { ...defaultRules()[code], ...numbers };
  return findRuleMask(code, { placed, alongM: distanceAlongPasses(placed) }, rule);
}

/** Indices of what a mask takes out. */
export function taken(marks: Uint8Array | undefined): number[] {
  return Array.from(marks ?? []).flatMap((mark, at) => (mark === 1 ? [at] : []));
}

/** The default rules with some changed. */
export function rulesWith(changes: { [Code in CleaningCode]?: Partial<CleaningRules[Code]> }): CleaningRules {
  const rules = Object.entries(defaultRules()).map(([code, rule]) => [
    code,
    { ...rule, ...changes[code as CleaningCode] },
  ]);
  return Object.fromEntries(rules) as CleaningRules;
}
