"use client";

import { useState } from "react";
import type { ChannelUnits } from "@/components/field-book/use-channel-units";
import { areClassEdges } from "@/lib/legend/class-edges";

export interface EdgeFieldsProps {
  edges: readonly number[];
  colours: readonly string[];
  /** Share of the distance that rows drove in each class. */
  shares: readonly number[];
  units: ChannelUnits;
  onChange: (edges: number[]) => void;
}

/** The classes side by side, each edge a number that can be typed. */
export function EdgeFields({ edges, colours, shares, units, onChange }: EdgeFieldsProps) {
  const change = (index: number, value: number) => {
    const next = edges.map((edge, i) => (i === index ? value : edge));
    if (!areClassEdges(next)) return false;
    onChange(next);
    return true;
  };
  return (
    <div className="tabular min-w-0">
      <div className="flex">
        {colours.map((colour, index) => (
          <div key={index} className="min-w-0 flex-1">
            <div
              data-testid="class-swatch"
              data-colour={colour}
              className="h-4 border-y border-ink/30 first:border-l last:border-r"
              style={{ background: colour }}
            />
          </div>
        ))}
      </div>
      <div className="relative h-8 md:h-7">
        {edges.map((edge, index) => (
          <div
            key={index}
            className="absolute top-0 -translate-x-1/2"
            style={{ left: `${((index + 1) / colours.length) * 100}%` }}
          >
            <EdgeField
              label={`Class edge ${index + 1}, ${units.symbol}`}
              value={edge}
              units={units}
              onEdge={(value) => change(index, value)}
            />
          </div>
        ))}
      </div>
      <div
        className="flex text-[11px] leading-4 text-ink-soft"
        role="group"
        aria-label="Share of distance in each class"
      >
        {shares.map((share, index) => (
          <span key={index} className="min-w-0 flex-1 text-center">
            {shareText(share)}
          </span>
        ))}
      </div>
      {shares.length > 0 ? <p className="text-center text-[11px] leading-4 text-ink-soft">share of distance</p> : null}
    </div>
  );
}

/** "12 %"; a share that is not nothing, or not quite all, never reads as 0 or 100. */
function shareText(share: number): string {
  const rounded = Math.round(share * 100);
  if (rounded === 0 && share > 0) return "<1\u202f%";
  return rounded === 100 && share < 1 ? ">99\u202f%" : `${rounded}\u202f%`;
}

interface EdgeFieldProps {
  label: string;
  value: number;
  units: ChannelUnits;
  /** Answers whether the edge could be taken. */
  onEdge: (value: number) => boolean;
}

function EdgeField({ label, value, units, onEdge }: EdgeFieldProps) {
  const [draft, setDraft] = useState<string | null>(null);
  const shown = edgeText(value / units.factor, units.decimals);
  const keep = () => {
    const typed = Number((draft ?? "").replace(",", ".").replace("\u2212", "-"));
    if (draft !== null && draft !== shown && draft.trim() !== "" && Number.isFinite(typed))
      onEdge(typed * units.factor);
    // An edge out of order goes back to what it was: the number in the field is always the one in force.
    setDraft(null);
  };
  return (
    <input
      aria-label={label}
      inputMode="decimal"
      value={draft ?? shown}
      onChange={(event) => setDraft(event.target.value)}
      onFocus={(event) => event.target.select()}
      onBlur={keep}
      onKeyDown={(event) => {
        if (event.key === "Enter") keep();
        if (event.key === "Escape") setDraft(null);
      }}
      className="h-8 w-14 rounded border border-transparent bg-transparent text-center text-table hover:border-edge focus:border-edge focus:bg-sheet md:h-7"
    />
  );
}

/** The unit's own decimals, more where the edge is small, with a true minus sign. */
function edgeText(value: number, decimals: number): string {
  const isLarge = Math.abs(value) >= 10 ** (1 - decimals) || value === 0;
  return String(Number(isLarge ? value.toFixed(decimals) : value.toPrecision(2))).replace("-", "\u2212");
}
