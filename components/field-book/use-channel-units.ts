"use client";

import { useMemo } from "react";
import { useUnits } from "@/components/units/use-units";
import { categoryAt } from "@/lib/legend/categories";
import { displayUnit } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

export interface ChannelUnits {
  symbol: string;
  /** SI units in one shown unit. */
  factor: number;
  decimals: number;
  /** "943 N"; a dash where missing. */
  format: (valueSi: number | null | undefined) => string;
}

/** What a reading that is a name is called. */
function nameOf(channel: string, value: number | null | undefined): string | null {
  return typeof value === "number" ? (categoryAt(channel, value)?.name ?? null) : null;
}

/** Readings of 0 and 1, whose mean is a share. */
function isMask(channel: string): boolean {
  return channel === "underTarget" || channel === "atLimit";
}

/** How a channel's values are shown to this person. */
export function useChannelUnits(unit: string, channel: string): ChannelUnits {
  const { system } = useUnits();
  return useMemo(() => {
    const { symbol, factor, decimals } = displayUnit(unit, system, channel);
    return {
      symbol,
      factor,
      decimals,
      format: (valueSi) =>
        nameOf(channel, valueSi) ??
        formatQuantity(valueSi ?? null, isMask(channel) ? "fraction" : unit, system, { channel }).text,
    };
  }, [unit, channel, system]);
}
