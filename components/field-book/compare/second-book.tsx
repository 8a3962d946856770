"use client";

import { createContext, useContext, useEffect, useMemo, type ReactNode } from "react";
import { channelsOf } from "@/components/field-book/channel-switch";
import { FieldBookProvider, useBook, useBookState, type Book } from "@/components/field-book/field-book-context";
import { createFieldBookStore } from "@/lib/map-state/field-book-store";
import { linkBooks } from "@/lib/map-state/link-books";
import type { Log } from "@/lib/schemas/logs";

interface Second {
  /** The other side of the comparison; null where nothing is compared. */
  book: Book | null;
  /** Logs of the field that can be looked at, the open one among them. */
  logs: readonly Log[];
  compared: readonly [Log, Log] | null;
}

const SecondContext = createContext<Second>({ book: null, logs: [], compared: null });

/** Opens a second book beside the first while something is compared, and keeps what they share the same in both. */
export function SecondBookProvider({ logs, children }: { logs: readonly Log[]; children: ReactNode }) {
  const { store, log } = useBook();
  const isComparing = useBookState((state) => state.comparison !== null);
  const otherId = useBookState((state) => state.comparison?.logId ?? null);
  const other = otherId === null ? log : (logs.find(({ id }) => id === otherId) ?? log);
  const book = useMemo(() => (isComparing ? openSecond(store.getState(), other) : null), [store, other, isComparing]);
  const isOneLog = other.id === log.id;
  useEffect(() => (book ? linkBooks(store, book.store, isOneLog) : undefined), [store, book, isOneLog]);
  const second = useMemo<Second>(() => ({ book, logs, compared: book ? [log, book.log] : null }), [book, log, logs]);
  return <SecondContext.Provider value={second}>{children}</SecondContext.Provider>;
}

/** The channel a log can be compared by: the one asked for, else the log's first. */
export function channelOrFirst(log: Log, channel: string | undefined): string {
  const channels = channelsOf(log);
  return channel !== undefined && channels.includes(channel) ? channel : (channels[0] ?? "rowSpeed");
}

function openSecond(first: ReturnType<Book["store"]["getState"]>, log: Log): Book {
  return {
    store: createFieldBookStore({
      channel: channelOrFirst(log, first.comparison?.channel),
      view: first.view,
      cleaned: first.cleaned,
    }),
    log,
    logVersion: { logId: log.id, version: log.version, revision: log.revision },
  };
}

export function useSecondBook(): Book | null {
  return useContext(SecondContext).book;
}

export function useComparableLogs(): readonly Log[] {
  return useContext(SecondContext).logs;
}

/** The logs of the two sides, the open one first; null where nothing is compared. */
export function useLogsCompared(): readonly [Log, Log] | null {
  return useContext(SecondContext).compared;
}

/** Draws its children for the other side of a comparison; nothing where nothing is compared. */
export function InSecondBook({ children }: { children: ReactNode }) {
  const book = useSecondBook();
  return book ? <FieldBookProvider book={book}>{children}</FieldBookProvider> : null;
}
