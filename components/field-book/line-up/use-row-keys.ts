"use client";

import type { KeyboardEvent } from "react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";

/** Left and right arrows choose the row before or after, of `rows`. */
export function useRowKeys(rows: number): (event: KeyboardEvent) => void {
  const { store } = useBook();
  const selected = useBookState((state) => state.row);
  return (event) => {
    const by = { ArrowLeft: -1, ArrowRight: 1 }[event.key];
    if (by === undefined) return;
    event.preventDefault();
    const next = Math.min(rows, Math.max(1, (selected ?? (by > 0 ? 0 : rows + 1)) + by));
    if (next !== selected) store.getState().chooseRow(next);
  };
}
