"use client";

import { useMemo } from "react";
import { readingWords } from "@/components/cleaning/count-words";
import { PictureCanvas } from "@/components/field-book/picture-canvas";
import type { CleaningCode } from "@/lib/cleaning/rule-catalogue";
import { reasonSwatch } from "@/lib/map-state/reason-patterns";
import type { CleaningItem } from "@/lib/schemas/cleaning";

const SWATCH = { width: 32, height: 16 } as const;

/** What the patterns on the map mean: the first rule that took a reading out, and how many it took. */
export function ReasonLegend({ items }: { items: readonly CleaningItem[] }) {
  const shown = items.filter((item) => item.on && item.fixed === null && item.takenOutFirst > 0);
  if (shown.length === 0) {
    return (
      <p className="text-table text-ink-soft">The rules in force leave no reading out, so both maps show the same.</p>
    );
  }
  return (
    <div className="space-y-1">
      <p className="text-table text-ink-soft">Left out on the right, by the first rule that took the reading:</p>
      <ul className="flex flex-wrap gap-x-6 gap-y-2">
        {shown.map((item) => (
          <li key={item.code} className="flex items-center gap-2 text-table">
            <Swatch code={item.code} />
            <span>
              {item.label}{" "}
              <span className="tabular whitespace-nowrap text-ink-soft">{readingWords(item.takenOutFirst)}</span>
            </span>
          </li>
        ))}
      </ul>
    </div>
  );
}

function Swatch({ code }: { code: CleaningCode }) {
  const picture = useMemo(() => reasonSwatch(code, SWATCH.width, SWATCH.height), [code]);
  return (
    <span className="relative inline-block border border-edge" style={SWATCH} aria-hidden="true">
      <PictureCanvas picture={picture} label="" />
    </span>
  );
}
