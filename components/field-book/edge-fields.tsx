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
  const [refusal, setRefusal] = useState<string | null>(null);
  const change = (index: number, typed: string) => {
    const value = readEdge(typed) * units.factor;
    const next = edges.map((edge, i) => (i === index ? value : edge));
    const why = whyNoEdge(typed, { index, next, edges, units });
    setRefusal(why);
    if (why === null) onChange(next);
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
              onEdge={(typed) => change(index, typed)}
              onStart={() => setRefusal(null)}
            />
          </div>
        ))}
      </div>
      {refusal === null ? null : (
        <p role="alert" className="py-0.5 text-table text-clay">
          {refusal}
        </p>
      )}
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
export function shareText(share: number): string {
  const rounded = Math.round(share * 100);
  if (rounded === 0 && share > 0) return "<1\u202f%";
  return rounded === 100 && share < 1 ? ">99\u202f%" : `${rounded}\u202f%`;
}

interface EdgeFieldProps {
  label: string;
  value: number;
  units: ChannelUnits;
  /** Called with what was typed, once it is done. */
  onEdge: (typed: string) => void;
  onStart: () => void;
}

function EdgeField({ label, value, units, onEdge, onStart }: EdgeFieldProps) {
  const [draft, setDraft] = useState<string | null>(null);
  const shown = edgeText(value / units.factor, units.decimals);
  const keep = () => {
    if (draft !== null && draft !== shown && draft.trim() !== "") onEdge(draft);
    // An edge that cannot be goes back to what it was: the number in the field is always the one in force.
    setDraft(null);
  };
  return (
    <input
      aria-label={label}
      inputMode="decimal"
      value={draft ?? shown}
      onChange={(event) => {
        setDraft(event.target.value);
        onStart();
      }}
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

/** A decimal comma and a true minus sign are read as a keyboard's own; NaN for what is no number. */
export function readEdge(typed: string): number {
  return Number(typed.trim().replace(",", ".").replace("\u2212", "-"));
}

interface TypedEdge {
  index: number;
  next: readonly number[];
  edges: readonly number[];
  units: ChannelUnits;
}

/** Why a typed edge cannot be taken; null where it can. */
function whyNoEdge(typed: string, { index, next, edges, units }: TypedEdge): string | null {
  if (!Number.isFinite(readEdge(typed))) return `“${typed.trim()}” is no number; the edge stays as it was.`;
  if (areClassEdges(next)) return null;
  const [before, after] = [edges[index - 1], edges[index + 1]];
  const bounds = [
    before === undefined ? "" : `above ${units.format(before)}`,
    after === undefined ? "" : `below ${units.format(after)}`,
  ].filter((bound) => bound !== "");
  return `This edge must lie ${bounds.join(" and ")}, so that the classes keep their order; it stays as it was.`;
}

/** The unit's own decimals, one more for an edge between them, more where the edge is small; with a true minus sign. */
export function edgeText(value: number, decimals: number): string {
  const isLarge = Math.abs(value) >= 10 ** (1 - decimals) || value === 0;
  const isBetween = Math.abs(value - Number(value.toFixed(decimals))) > 0.05 * 10 ** -decimals;
  const text = isLarge ? value.toFixed(isBetween ? decimals + 1 : decimals) : value.toPrecision(2);
  return String(Number(text)).replace("-", "\u2212");
}
