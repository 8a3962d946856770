"use client";

import { useState } from "react";
import { TextField } from "@/components/ui/form-field";
import { useUnits } from "@/components/units/use-units";
import { displayUnit } from "@/lib/units/display-unit";

export interface QuantityInputProps {
  label: string;
  hint?: string;
  error?: string;
  /** SI value; undefined where nothing is entered. */
  value: number | undefined;
  onChange: (valueSi: number | undefined) => void;
  onBlur?: () => void;
  unit: string;
  /** `rowSpacing` for lengths one measures with a ruler. */
  channel?: string;
}

/** Text to a number; a decimal comma is a decimal point. NaN for what is no number, so that it is refused and not lost. */
export function parseEntry(text: string): number | undefined {
  const clean = text.trim().replace(",", ".");
  if (clean === "") return undefined;
  return /^[-+]?\d*\.?\d+$/.test(clean) ? Number(clean) : NaN;
}

/** Five figures are enough to read; the value itself stays exact until somebody types another. */
function writeEntry(valueSi: number | undefined, factor: number): string {
  if (valueSi === undefined || Number.isNaN(valueSi)) return "";
  return String(Number((valueSi / factor).toPrecision(5)));
}

/** A number with a unit, kept in SI and typed in the person's units. To set it from outside, give it another `key`. */
export function QuantityInput(props: QuantityInputProps) {
  const { label, hint, error, value, unit, channel, onChange, onBlur } = props;
  const { system } = useUnits();
  const shown = displayUnit(unit, system, channel);
  const [text, setText] = useState(() => writeEntry(value, shown.factor));
  const [writtenFor, setWrittenFor] = useState(system);
  // The units changed under the person: what was typed is said anew.
  if (writtenFor !== system) {
    setWrittenFor(system);
    setText(writeEntry(value, shown.factor));
  }
  return (
    <TextField
      label={label}
      hint={hint}
      error={error}
      unit={shown.symbol}
      inputMode="decimal"
      autoComplete="off"
      value={text}
      onBlur={onBlur}
      onChange={(event) => {
        setText(event.target.value);
        const entry = parseEntry(event.target.value);
        onChange(entry === undefined ? undefined : entry * shown.factor);
      }}
    />
  );
}
