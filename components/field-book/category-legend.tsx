"use client";

import { useId } from "react";
import { shareText } from "@/components/field-book/edge-fields";
import type { Category, CategoryPattern } from "@/lib/legend/categories";

export interface CategoryLegendProps {
  categories: readonly Category[];
  /** Share of distance of each; empty while not known. */
  shares: readonly number[];
}

/** What the colours mean where readings are names: a swatch with colour, pattern and letter, the name, and its share. */
export function CategoryLegend({ categories, shares }: CategoryLegendProps) {
  return (
    <ul
      className="grid gap-x-5 gap-y-1 text-table sm:grid-cols-2 xl:grid-cols-3"
      aria-label="Classes by share of distance"
    >
      {categories.map((category, index) => (
        <li key={category.code} className="flex min-w-0 items-center gap-2" title={category.meaning}>
          <CategorySwatch category={category} />
          <span className="min-w-0">
            {category.name}
            <span className="tabular whitespace-nowrap text-ink-soft">
              {shares[index] === undefined ? "" : ` ${shareText(shares[index])} of distance`}
            </span>
          </span>
        </li>
      ))}
    </ul>
  );
}

const SIZE = { width: 34, height: 18 } as const;

/** Strokes of a pattern within a square of 6. */
const STROKES: Record<CategoryPattern, string | null> = {
  plain: null,
  rising: "M-1,7 L7,-1 M-1,1 L1,-1 M5,7 L7,5",
  falling: "M-1,-1 L7,7 M5,-1 L7,1 M-1,5 L1,7",
  across: "M0,3 L6,3",
  upright: "M3,0 L3,6",
  dots: "M2,3 L4,3 M5,0 L7,0 M5,6 L7,6 M-1,0 L1,0 M-1,6 L1,6",
};

function CategorySwatch({ category: { colour, letter, pattern } }: { category: Category }) {
  const id = useId();
  const strokes = STROKES[pattern];
  return (
    <svg
      {...SIZE}
      className="shrink-0 border border-ink/30 [print-color-adjust:exact]"
      data-testid="class-swatch"
      data-colour={colour}
      data-pattern={pattern}
      aria-hidden="true"
    >
      <rect width="100%" height="100%" fill={colour} />
      {strokes ? (
        <>
          <pattern id={id} width="6" height="6" patternUnits="userSpaceOnUse">
            <path d={strokes} stroke="#FFFFFF" strokeOpacity={0.75} strokeWidth={1.25} />
          </pattern>
          <rect width="100%" height="100%" fill={`url(#${id})`} />
        </>
      ) : null}
      <rect x={SIZE.width / 2 - 7} y={2} width={14} height={SIZE.height - 4} fill="#FFFFFF" fillOpacity={0.9} />
      <text x="50%" y="50%" dy="0.36em" textAnchor="middle" fontSize={12} fontWeight={600} fill="#1E2430">
        {letter}
      </text>
    </svg>
  );
}
