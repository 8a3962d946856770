"use client";

import { channelsOf } from "@/components/field-book/channel-switch";
import { useBook, useBookState } from "@/components/field-book/field-book-context";

/** Opens and closes the comparison; it begins with the reading that stands next to the one shown. */
export function CompareButton() {
  const { store, log } = useBook();
  const isComparing = useBookState((state) => state.comparison !== null);
  const begin = () => {
    const { channel, compareWith } = store.getState();
    const next = channelsOf(log).find((id) => id !== channel) ?? channel;
    compareWith(isComparing ? null : { mode: "swipe", channel: next, logId: null });
  };
  return (
    <button
      type="button"
      aria-pressed={isComparing}
      onClick={begin}
      className="min-h-11 shrink-0 rounded border border-edge bg-sheet px-3 text-table hover:border-ink aria-pressed:bg-ink aria-pressed:text-paper md:min-h-8"
    >
      Compare
    </button>
  );
}
