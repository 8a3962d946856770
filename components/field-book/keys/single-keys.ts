"use client";

import { useSyncExternalStore } from "react";

const NAME = "coulterbook.single-keys";
const CHANGED = "coulterbook:single-keys";

function areOn(): boolean {
  try {
    return window.localStorage.getItem(NAME) !== "off";
  } catch {
    // Storage is barred: the keys stay on.
    return true;
  }
}

/** Keeps on this device whether keys without Ctrl or Alt do something wherever one is on the page. */
export function setSingleKeys(on: boolean): void {
  try {
    window.localStorage.setItem(NAME, on ? "on" : "off");
  } catch {
    // Storage is barred: nothing can be kept.
  }
  window.dispatchEvent(new Event(CHANGED));
}

function subscribe(onChange: () => void): () => void {
  window.addEventListener(CHANGED, onChange);
  return () => window.removeEventListener(CHANGED, onChange);
}

/** Speech input types letters that nobody meant as keys: whoever uses it turns them off (WCAG 2.1.4). */
export function useSingleKeys(): boolean {
  return useSyncExternalStore(subscribe, areOn, () => true);
}
