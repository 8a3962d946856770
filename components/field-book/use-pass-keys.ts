"use client";

import { useEffect, type KeyboardEvent } from "react";
import { useBook } from "@/components/field-book/field-book-context";
import type { PassTrack } from "@/lib/map-state/pass-track";

/** Records a step with Shift held. */
const LONG_STEP = 10;

/** Arrows move the cursor, brackets change the pass, Enter keeps the row, Escape lets go. */
export function usePassKeys(track: PassTrack | undefined, passes: readonly number[], onSpoken: () => void) {
  const { store } = useBook();
  useEffect(() => {
    // The pass stepped to may be shorter than the one before.
    const { cursor, pointAt } = store.getState();
    if (track && track.records > 0 && cursor?.pass === track.pass && cursor.record >= track.records) {
      pointAt({ ...cursor, record: track.records - 1 });
    }
  }, [store, track]);
  return (event: KeyboardEvent) => {
    if (!track || event.altKey || event.ctrlKey || event.metaKey) return;
    const state = store.getState();
    const cursor =
      state.cursor?.pass === track.pass ? state.cursor : { pass: track.pass, record: 0, row: state.row ?? 1 };
    const step = event.shiftKey ? LONG_STEP : 1;
    const move = (records: number, rows: number) =>
      state.pointAt({
        pass: track.pass,
        record: clamp(cursor.record + records, 0, track.records - 1),
        row: clamp(cursor.row + rows, 1, track.rows),
      });
    const actions: Record<string, (() => void) | undefined> = {
      ArrowRight: () => move(step, 0),
      ArrowLeft: () => move(-step, 0),
      ArrowDown: () => move(0, 1),
      ArrowUp: () => move(0, -1),
      Home: () => move(-track.records, 0),
      End: () => move(track.records, 0),
      "[": () => state.stepPass(-1, passes),
      "]": () => state.stepPass(1, passes),
      Enter: () => state.chooseRow(cursor.row),
      Escape: () => {
        state.pointAt(null);
        state.brush(null);
        if (state.row !== null) state.chooseRow(state.row);
      },
    };
    const action = actions[event.key];
    if (!action) return;
    event.preventDefault();
    onSpoken();
    action();
  };
}

function clamp(value: number, low: number, high: number): number {
  return Math.min(high, Math.max(low, value));
}
