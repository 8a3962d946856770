"use client";

import { useMemo } from "react";
import { useUnits } from "@/components/units/use-units";
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

/** How a channel's values are shown to this person. */
export function useChannelUnits(unit: string, channel: string): ChannelUnits {
  const { system } = useUnits();
  return useMemo(() => {
    const { symbol, factor, decimals } = displayUnit(unit, system, channel);
    return {
      symbol,
      factor,
      decimals,
      format: (valueSi) => formatQuantity(valueSi ?? null, unit, system, { channel }).text,
    };
  }, [unit, channel, system]);
}
