"use client";

import { useEffect, useRef } from "react";
import { useStore } from "zustand";
import type { StoreApi } from "zustand/vanilla";
import type { RemovalsState } from "@/components/removals/removals-store";
import { Button } from "@/components/ui/button";

/** A dialog closing gives the focus back to what opened it, which may be gone: the bar takes it after that. */
const AFTER_DIALOG_MS = 200;

/** Says what was removed for as long as that can be called off, over the foot of the page. */
export function UndoBar({ store }: { store: StoreApi<RemovalsState> }) {
  const { waiting, refused, undo, forgetRefused } = useStore(store);
  const button = useRef<HTMLButtonElement>(null);
  const last = waiting.at(-1);
  useEffect(() => {
    if (last === undefined) return;
    const timer = setTimeout(() => button.current?.focus(), AFTER_DIALOG_MS);
    return () => clearTimeout(timer);
  }, [last]);
  return (
    <div
      role="status"
      className="no-print fixed inset-x-3 bottom-16 z-40 mx-auto max-w-xl md:bottom-4 [&:empty]:hidden"
    >
      {last ? (
        <div className="flex items-center justify-between gap-3 rounded border border-ink bg-sheet px-4 py-2">
          <p className="min-w-0">
            <span className="font-semibold wrap-anywhere">{last.name}</span> is removed. It can be brought back for half
            a minute, or until you close this page.
          </p>
          <Button ref={button} onClick={() => undo(last.id)}>
            Undo
          </Button>
        </div>
      ) : refused ? (
        <div className="flex items-center justify-between gap-3 rounded border border-clay bg-sheet px-4 py-2">
          <p className="min-w-0">
            <span className="font-semibold wrap-anywhere">{refused.name}</span> is still here. {refused.words}
          </p>
          <Button kind="quiet" onClick={forgetRefused}>
            Close
          </Button>
        </div>
      ) : null}
    </div>
  );
}
