"use client";

import { useEffect, useRef } from "react";
import { useBook, useLogVersion } from "@/components/field-book/field-book-context";
import { useShowOnMap } from "@/components/field-book/keys/use-show-on-map";
import { useSingleKeys } from "@/components/field-book/keys/single-keys";
import { usePasses } from "@/components/field-book/use-log-data";

/** Where letters are meant as letters, or another key map holds. */
const TYPING =
  "input, textarea, select, [contenteditable='true'], [role='dialog'], [role='menu'], [role='alertdialog']";

/** Keys that work anywhere on the page: brackets step through passes, m has the map follow, ? opens the key map, Escape lets the stretch go. */
export function useBookKeys(onHelp: () => void): void {
  const { store } = useBook();
  const { data: passes } = usePasses(useLogVersion());
  const areOn = useSingleKeys();
  const showOnMap = useShowOnMap();
  const step = (by: 1 | -1) => store.getState().stepPass(by, passes?.map(({ pass }) => pass) ?? []);
  const actions: Record<string, (() => void) | undefined> = {
    ...(areOn ? { "?": onHelp, "[": () => step(-1), "]": () => step(1), m: showOnMap } : {}),
    Escape: () => store.getState().brush(null),
  };
  const latest = useRef(actions);
  useEffect(() => {
    latest.current = actions;
  });
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      const isTyping = event.target instanceof Element && event.target.closest(TYPING) !== null;
      if (event.defaultPrevented || isTyping || event.ctrlKey || event.altKey || event.metaKey) return;
      const action = latest.current[event.key];
      if (!action) return;
      event.preventDefault();
      action();
    };
    window.addEventListener("keydown", onKeyDown);
    return () => window.removeEventListener("keydown", onKeyDown);
  }, []);
}
