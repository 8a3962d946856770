"use client";

import { useQueryClient, type QueryKey } from "@tanstack/react-query";
import { createContext, useCallback, useContext, useEffect, useState, type ReactNode } from "react";
import type { StoreApi } from "zustand/vanilla";
import { useStore } from "zustand";
import { createRemovals, type RemovalsState } from "@/components/removals/removals-store";
import { UndoBar } from "@/components/removals/undo-bar";

/** Where nothing waits (outside a workspace) a removal is sent at once. */
const RemovalsContext = createContext<StoreApi<RemovalsState>>(createRemovals(0));

export interface RemovalsProviderProps {
  children: ReactNode;
  /** Milliseconds before a removal is sent; for tests. */
  waitMs?: number;
}

/** Keeps removals from page to page of a workspace, with the bar that calls them off. */
export function RemovalsProvider({ children, waitMs }: RemovalsProviderProps) {
  const [store] = useState(() => createRemovals(waitMs));
  useEffect(() => {
    const sendAll = () => store.getState().sendAll();
    window.addEventListener("pagehide", sendAll);
    return () => window.removeEventListener("pagehide", sendAll);
  }, [store]);
  return (
    <RemovalsContext.Provider value={store}>
      {children}
      <UndoBar store={store} />
    </RemovalsContext.Provider>
  );
}

export interface RemovalRequest {
  id: string;
  name: string;
  /** The deletion itself. */
  remove: () => Promise<void>;
  /** Lists that held it, to be asked for again. */
  lists: readonly { queryKey: QueryKey; exact?: boolean }[];
}

/** Removes after a time in which it can be called off. */
export function useRemove(): (request: RemovalRequest) => void {
  const store = useContext(RemovalsContext);
  const client = useQueryClient();
  return useCallback(
    ({ id, name, remove, lists }) =>
      store.getState().begin({
        id,
        name,
        send: async () => {
          await remove();
          await Promise.all(lists.map((list) => client.invalidateQueries(list)));
        },
      }),
    [store, client],
  );
}

/** A list without what is being removed. */
export function useWithoutRemoved<Item extends { id: string }>(items: Item[] | undefined): Item[] | undefined {
  const waiting = useStore(useContext(RemovalsContext), (state) => state.waiting);
  if (waiting.length === 0) return items;
  return items?.filter((item) => !waiting.some((removal) => removal.id === item.id));
}
