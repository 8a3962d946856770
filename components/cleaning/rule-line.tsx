"use client";

import { useId } from "react";
import { readingWords, shareWords } from "@/components/cleaning/count-words";
import type { RuleDraft } from "@/components/cleaning/cleaning-draft";
import { RuleNumberField } from "@/components/cleaning/rule-number-field";
import { classNames } from "@/components/ui/class-names";
import type { CleaningItem } from "@/lib/schemas/cleaning";
import { formatNumber } from "@/lib/units/format-quantity";

export interface RuleLineProps {
  item: CleaningItem;
  /** Channels that the log has: numbers about others would do nothing. */
  channels: readonly string[];
  rule: RuleDraft;
  problems: Record<string, string> | undefined;
  /** Why nobody may touch it here; null where somebody may. */
  locked: boolean;
  /** Counts are of the rules before; new ones are on their way. */
  isCounting: boolean;
  onChange: (change: Partial<RuleDraft>) => void;
}

/** More to say about a rule whose words need a measure explained. */
const EXPLAINED: Partial<Record<CleaningItem["code"], string>> = {
  "local-outlier":
    "A usual spread is taken from the middle of the readings, so strays do not widen it: half of all readings lie within two thirds of a spread from their middle.",
};

/** Readings that tell of lost contact lie at margins of 0 and below, those near it just above. */
function leavesOutLowMargins({ code }: CleaningItem, rule: RuleDraft): boolean {
  return code === "physical-range" && Number(rule.marginMinN) > 0;
}

/** One rule: switch, what it does in words, its numbers, and what it takes out. */
export function RuleLine({ item, channels, rule, problems, locked, isCounting, onChange }: RuleLineProps) {
  const id = useId();
  const explained = EXPLAINED[item.code];
  const parameters = item.parameters.filter(({ channel }) => channel === null || channels.includes(channel));
  return (
    <li
      className="grid gap-x-6 gap-y-2 border-b border-rule py-3 md:grid-cols-[minmax(0,1fr)_15rem]"
      data-rule={item.code}
    >
      <div className="flex min-w-0 items-start gap-3">
        <input
          id={id}
          type="checkbox"
          role="switch"
          checked={rule.on}
          disabled={locked || item.fixed !== null}
          aria-describedby={`${id}-words`}
          onChange={(event) => onChange({ on: event.target.checked })}
          className="mt-3 h-5 w-5 shrink-0 accent-ink md:mt-1"
        />
        <div className="min-w-0 flex-1 space-y-1">
          <label htmlFor={id} className="flex min-h-11 items-center font-semibold md:min-h-7">
            {item.label}
          </label>
          <p id={`${id}-words`} className="max-w-prose text-table text-ink-soft">
            Leaves out readings that {item.words}. {explained}
            {item.fixed ? <span className="block">Always on. {item.fixed}</span> : null}
          </p>
          {parameters.length > 0 ? (
            <div
              role="group"
              aria-label={`Numbers of “${item.label}”`}
              className={classNames(
                "gap-x-6 gap-y-1 pt-1",
                parameters.length > 4 ? "grid md:grid-cols-2" : "flex flex-wrap",
              )}
            >
              {parameters.map((parameter) => (
                <RuleNumberField
                  key={parameter.name}
                  parameter={parameter}
                  value={Number(rule[parameter.name])}
                  error={problems?.[parameter.name]}
                  disabled={locked}
                  inColumn={parameters.length > 4}
                  onChange={(value) => onChange({ [parameter.name]: value })}
                />
              ))}
            </div>
          ) : null}
          {leavesOutLowMargins(item, rule) && channels.includes("margin") ? (
            <p className="max-w-prose border-l-2 border-straw pl-2 text-table">
              <b className="font-semibold text-straw-deep">Caution.</b> Leaving out low margins improves the verdict:
              lost contact is what it looks for.
            </p>
          ) : null}
        </div>
      </div>
      <RuleCounts item={item} isCounting={isCounting} />
    </li>
  );
}

/** What the rule takes out by itself, and how much of that no rule before it took. */
function RuleCounts({ item, isCounting }: { item: CleaningItem; isCounting: boolean }) {
  return (
    <div
      className={classNames("tabular text-table max-md:pl-8 md:text-right", isCounting && "opacity-50")}
      aria-busy={isCounting}
    >
      <p className={item.readings > 0 ? "font-semibold" : "text-ink-soft"}>
        {item.on || item.readings === 0 ? "" : "would take out "}
        {readingWords(item.readings)}
        {item.readings > 0 ? <span className="font-normal text-ink-soft">, {shareWords(item.share)}</span> : null}
      </p>
      {item.on && item.readings > 0 ? (
        <p className="text-ink-soft">
          {item.takenOutFirst === item.readings
            ? "none of them taken by a rule above"
            : `${formatNumber(item.takenOutFirst, 0)} of them not taken by a rule above`}
        </p>
      ) : null}
    </div>
  );
}
