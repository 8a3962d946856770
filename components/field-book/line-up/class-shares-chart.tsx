"use client";

import { shareText } from "@/components/field-book/edge-fields";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { useRowKeys } from "@/components/field-book/line-up/use-row-keys";
import { categoriesOf, type Category } from "@/lib/legend/categories";
import type { RowStatisticsBody, RowStatisticsItem } from "@/lib/schemas/logs";

/** Shares of the distance of each row under each name, one column a row, left to right looking forward; the legend's order from the top. */
export function ClassSharesChart({ statistics: { channel, items } }: { statistics: RowStatisticsBody }) {
  const { store } = useBook();
  const selected = useBookState((state) => state.row);
  const categories = categoriesOf(channel) ?? [];
  const every = Math.ceil(items.length / 12);
  return (
    <div className="flex h-full min-h-0 gap-2 text-table text-ink-soft">
      <div className="flex flex-col justify-between pb-5 text-right" aria-hidden>
        <span>100 %</span>
        <span>50 %</span>
        <span>0 %</span>
      </div>
      <div
        role="listbox"
        tabIndex={0}
        aria-label="Rows from left to right looking forward. Left and right arrows choose a row."
        aria-activedescendant={selected === null ? undefined : `line-up-row-${selected}`}
        onKeyDown={useRowKeys(items.length)}
        className="flex min-w-0 flex-1 gap-px"
      >
        {items.map((item) => (
          <div
            key={item.row}
            id={`line-up-row-${item.row}`}
            role="option"
            aria-selected={item.row === selected}
            aria-label={sayShares(item, categories)}
            title={sayShares(item, categories)}
            onClick={() => store.getState().chooseRow(item.row)}
            className="flex min-w-0 flex-1 cursor-pointer flex-col"
          >
            <div className={`flex flex-1 flex-col ${item.row === selected ? "outline-2 outline-slate" : ""}`}>
              {categories.map(({ code, colour }) => (
                <div
                  key={code}
                  data-code={code}
                  className="[print-color-adjust:exact]"
                  style={{ background: colour, height: `${100 * shareOf(item, code)}%` }}
                />
              ))}
            </div>
            <span className="h-5 overflow-visible whitespace-nowrap text-center" aria-hidden>
              {item.row === selected || item.row === 1 || item.row % every === 0 ? item.row : ""}
            </span>
          </div>
        ))}
      </div>
    </div>
  );
}

/** Codes of a channel that has shares by class run from 1. */
function shareOf({ classShares }: RowStatisticsItem, code: number): number {
  return classShares?.[code - 1] ?? 0;
}

function sayShares(item: RowStatisticsItem, categories: readonly Category[]): string {
  if (!item.classShares) return `Row ${item.row}: no readings`;
  const parts = categories.filter(({ code }) => shareOf(item, code) > 0);
  return `Row ${item.row}: ${parts.map(({ code, name }) => `${name} ${shareText(shareOf(item, code))}`).join("; ")} of distance`;
}
