"use client";

import { createContext, useContext, useMemo, type ReactNode } from "react";
import { useStore } from "zustand";
import type { LogVersion } from "@/components/field-book/use-log-data";
import type { FieldBook, FieldBookStore } from "@/lib/map-state/field-book-store";
import type { Log } from "@/lib/schemas/logs";

export interface Book {
  store: FieldBookStore;
  log: Log;
  logVersion: LogVersion;
}

const BookContext = createContext<Book | null>(null);

export function FieldBookProvider({ book, children }: { book: Book; children: ReactNode }) {
  return <BookContext.Provider value={book}>{children}</BookContext.Provider>;
}

/** The open log and what is looked at in it. @throws outside a field's book. */
export function useBook(): Book {
  const book = useContext(BookContext);
  if (!book) throw new Error("useBook is for components inside a FieldBookProvider");
  return book;
}

/** One part of what is looked at; the component is drawn again only when that part changes. */
export function useBookState<Part>(select: (state: FieldBook) => Part): Part {
  return useStore(useBook().store, select);
}

/** The open log with its adjustments, or as it was read where the person chose so. */
export function useLogVersion(): LogVersion {
  const { logVersion } = useBook();
  const cleaned = useBookState((state) => state.cleaned);
  return useMemo(() => ({ ...logVersion, cleaned }), [logVersion, cleaned]);
}
