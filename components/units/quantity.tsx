"use client";

import { useUnits } from "@/components/units/use-units";

export interface QuantityProps {
  /** In SI; null where it is missing. */
  value: number | null;
  /** SI unit of the value. */
  unit: string;
  channel?: string;
  className?: string;
}

/** A number in the person's units: tabular figures, thin space, the unit softer. Missing is a dash, never 0. */
export function Quantity({ value, unit, channel, className }: QuantityProps) {
  const { parts } = useUnits();
  if (value === null || !Number.isFinite(value)) return <span className={className}>–</span>;
  const shown = parts(value, unit, channel);
  return (
    <span className={className ?? "tabular whitespace-nowrap"}>
      {shown.number}
      {shown.unit ? <span className="text-ink-soft">{shown.unit === "°" ? "°" : `\u202f${shown.unit}`}</span> : null}
    </span>
  );
}
