"use client";

import { ticks } from "d3-array";
import type { ChannelUnits } from "@/components/field-book/use-channel-units";
import { formatNumber } from "@/lib/units/format-quantity";

interface ValueAxisProps {
  low: number;
  high: number;
  units: Pick<ChannelUnits, "factor">;
  yOf: (valueSi: number) => number;
  left: number;
  right: number;
}

/** Round values of the person's unit at the left, with hairlines across. */
export function ValueAxis({ low, high, units, yOf, left, right }: ValueAxisProps) {
  const { factor } = units;
  const room = Math.abs(yOf(low) - yOf(high));
  const marks = ticks(low / factor, high / factor, Math.max(2, Math.floor(room / 32)));
  const step = (marks[1] ?? 1) - (marks[0] ?? 0);
  const decimals = Math.max(0, -Math.floor(Math.log10(step || 1) + 1e-9));
  return (
    <g className="tabular" fontSize={11} fill="#4A5261">
      {marks.map((mark) => (
        <g key={mark}>
          <line x1={left} x2={right} y1={yOf(mark * factor)} y2={yOf(mark * factor)} stroke="#E4E0D5" />
          <text x={left - 6} y={yOf(mark * factor) + 4} textAnchor="end">
            {formatNumber(mark, decimals)}
          </text>
        </g>
      ))}
    </g>
  );
}
