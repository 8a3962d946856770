"use client";

import { X } from "lucide-react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { ReadingWords } from "@/components/field-book/readout";
import { buttonClass } from "@/components/ui/button";

/** On a phone: the reading that was tapped, above the bottom bar, since the line that names it elsewhere is out of sight. */
export function TapSheet() {
  const { store } = useBook();
  const cursor = useBookState((state) => state.cursor);
  if (!cursor) return null;
  return (
    <div
      role="status"
      data-testid="tap-sheet"
      className="no-print fixed inset-x-0 bottom-14 z-20 md:bottom-0 md:left-[5.5rem] flex items-start justify-between gap-2 border-t border-rule bg-sheet py-1 pl-4 pr-1 shadow-[0_-4px_16px_rgb(30_36_48/0.12)]"
    >
      <p className="flex min-w-0 flex-1 flex-wrap gap-x-4 py-2 text-table text-ink-soft">
        <ReadingWords cursor={cursor} />
      </p>
      <button
        type="button"
        aria-label="Put the reading away"
        className={buttonClass("quiet", "px-3")}
        onClick={() => store.getState().pointAt(null)}
      >
        <X size={18} strokeWidth={1.5} aria-hidden />
      </button>
    </div>
  );
}
