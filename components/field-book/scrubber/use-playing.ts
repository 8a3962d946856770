"use client";

import { useEffect, useState } from "react";
import { useBook } from "@/components/field-book/field-book-context";
import { useShowMoment } from "@/components/field-book/scrubber/use-moment";
import { momentOf, workedUntil, type WorkClock } from "@/lib/map-state/work-clock";

/** Often enough to look like a motion, seldom enough to leave the map time to draw. */
const TICK_MS = 100;
/** Where the person wants no motion the field fills in steps. */
const STEP_MS = 2000;

const wantsNoMotion = () => window.matchMedia("(prefers-reduced-motion: reduce)").matches;

/** Lets the time at work run, `speed` times as fast as it was; stops at the end of the log. */
export function usePlaying(clock: WorkClock, { speed, startsPlaying }: { speed: number; startsPlaying: boolean }) {
  const { store } = useBook();
  const showMoment = useShowMoment(clock);
  const [isPlaying, setPlaying] = useState(startsPlaying);
  useEffect(() => {
    if (!isPlaying) return;
    let lastMs = performance.now();
    const timer = setInterval(
      () => {
        const nowMs = performance.now();
        const workedS = workedUntil(clock, store.getState().timeS ?? 0) + ((nowMs - lastMs) / 1000) * speed;
        lastMs = nowMs;
        showMoment(momentOf(clock, workedS));
        if (workedS >= clock.totalS) setPlaying(false);
      },
      wantsNoMotion() ? STEP_MS : TICK_MS,
    );
    return () => clearInterval(timer);
  }, [isPlaying, clock, speed, store, showMoment]);
  const toggle = () => {
    // From the end it begins anew.
    if (!isPlaying && workedUntil(clock, store.getState().timeS ?? Infinity) >= clock.totalS) {
      showMoment(momentOf(clock, 0));
    }
    setPlaying(!isPlaying);
  };
  return { isPlaying, toggle, pause: () => setPlaying(false) };
}
