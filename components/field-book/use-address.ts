"use client";

import { useEffect } from "react";
import { writeAddress } from "@/lib/map-state/address-state";
import type { FieldBookStore } from "@/lib/map-state/field-book-store";

/** Changes closer together than this are written once (browsers bar more than a hundred in half a minute). */
const PAUSE_MS = 300;

/** Keeps the address in step with what is looked at, so that it can be sent on. Adds nothing to the browser's history. */
export function useAddress(store: FieldBookStore, logId: string): void {
  useEffect(() => {
    let waiting: ReturnType<typeof setTimeout> | undefined;
    const write = () => {
      const { edges, ...state } = store.getState();
      const search = writeAddress({ ...state, log: logId, edges: edges[state.channel] ?? null });
      window.history.replaceState(window.history.state, "", `${window.location.pathname}?${search.toString()}`);
    };
    const stop = store.subscribe((now, before) => {
      const same =
        now.channel === before.channel &&
        now.pass === before.pass &&
        now.row === before.row &&
        now.edges === before.edges &&
        now.cleaned === before.cleaned &&
        now.ground === before.ground &&
        now.view === before.view;
      if (same) return;
      clearTimeout(waiting);
      waiting = setTimeout(write, PAUSE_MS);
    });
    return () => {
      clearTimeout(waiting);
      stop();
    };
  }, [store, logId]);
}
