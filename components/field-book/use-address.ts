"use client";

import { useEffect } from "react";
import { writeAddress } from "@/lib/map-state/address-state";
import type { FieldBookState, FieldBookStore } from "@/lib/map-state/field-book-store";

/** Changes closer together than this are written once (browsers bar more than a hundred in half a minute). */
const PAUSE_MS = 300;

/** The parts of the state that an address holds. */
const WRITTEN = [
  "channel",
  "pass",
  "row",
  "stretch",
  "edges",
  "cleaned",
  "ground",
  "view",
  "comparison",
  "timeS",
] as const satisfies (keyof FieldBookState)[];

/** The page's address for what is looked at now, from the root of the site. */
export function addressOf(store: FieldBookStore, logId: string): string {
  const { edges, ...state } = store.getState();
  const search = writeAddress({ ...state, log: logId, edges: edges[state.channel] ?? null });
  return `${window.location.pathname}?${search.toString()}`;
}

/** Keeps the address in step with what is looked at, so that it can be sent on. Adds nothing to the browser's history. */
export function useAddress(store: FieldBookStore, logId: string): void {
  useEffect(() => {
    let waiting: ReturnType<typeof setTimeout> | undefined;
    const write = () => window.history.replaceState(window.history.state, "", addressOf(store, logId));
    const stop = store.subscribe((now, before) => {
      if (WRITTEN.every((key) => now[key] === before[key])) return;
      clearTimeout(waiting);
      waiting = setTimeout(write, PAUSE_MS);
    });
    return () => {
      clearTimeout(waiting);
      stop();
    };
  }, [store, logId]);
}
