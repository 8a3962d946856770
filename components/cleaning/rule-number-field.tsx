"use client";

import { useId, useState } from "react";
import { ruleUnit } from "@/components/cleaning/rule-unit";
import { classNames } from "@/components/ui/class-names";
import { parseEntry } from "@/components/units/quantity-input";
import { useUnits } from "@/components/units/use-units";
import type { RuleParameter } from "@/lib/schemas/cleaning";

export interface RuleNumberFieldProps {
  parameter: RuleParameter;
  /** SI; NaN while what is typed is no number. */
  value: number;
  error: string | undefined;
  disabled: boolean;
  /** One of many, one under the other: the boxes stand in one line. */
  inColumn?: boolean;
  onChange: (value: number) => void;
}

/** Four figures are enough to read; the value itself stays exact until somebody types another. */
function write(value: number, factor: number): string {
  return Number.isFinite(value) ? String(Number((value / factor).toPrecision(4))) : "";
}

/** "first [5] m": a rule's number in the person's units, one line. */
export function RuleNumberField({ parameter, value, error, disabled, inColumn, onChange }: RuleNumberFieldProps) {
  const id = useId();
  const { system } = useUnits();
  const { factor, symbol } = ruleUnit(parameter.unit, system, parameter.channel);
  const [text, setText] = useState(() => write(value, factor));
  const [shown, setShown] = useState({ factor, value });
  // The units or the number changed from outside: what stands in the box is said anew.
  if (shown.factor !== factor || !Object.is(shown.value, value)) {
    setShown({ factor, value });
    setText(write(value, factor));
  }
  const enter = (typed: string) => {
    const entry = (parseEntry(typed) ?? NaN) * factor;
    setText(typed);
    setShown({ factor, value: entry });
    onChange(entry);
  };
  return (
    <div className="min-w-0">
      <div
        className={classNames(
          "gap-x-2",
          inColumn
            ? "grid grid-cols-[minmax(0,1fr)_8rem] items-center md:grid-cols-[8rem_minmax(0,1fr)]"
            : "flex flex-wrap items-center",
        )}
      >
        <label htmlFor={id} className="text-table text-ink-soft">
          {parameter.label}
        </label>
        <span className="flex items-center gap-1.5">
          <input
            id={id}
            inputMode="decimal"
            autoComplete="off"
            value={text}
            disabled={disabled}
            aria-invalid={error ? true : undefined}
            aria-describedby={classNames(symbol && `${id}-unit`, error && `${id}-error`) || undefined}
            onChange={(event) => enter(event.target.value)}
            className="tabular min-h-11 w-20 rounded border border-edge bg-sheet px-2 text-right aria-[invalid=true]:border-clay disabled:border-rule disabled:bg-paper disabled:text-ink-soft md:min-h-8"
          />
          {symbol ? (
            <span id={`${id}-unit`} className="text-table text-ink-soft">
              {symbol}
            </span>
          ) : null}
        </span>
      </div>
      {error ? (
        <p id={`${id}-error`} className="text-table text-clay">
          {error}
        </p>
      ) : null}
    </div>
  );
}
