"use client";

import { Pause, Play, X } from "lucide-react";
import { useState, type KeyboardEvent } from "react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { clockOf } from "@/components/field-book/readout";
import { usePlaying } from "@/components/field-book/scrubber/use-playing";
import { useShowMoment } from "@/components/field-book/scrubber/use-moment";
import { buttonClass } from "@/components/ui/button";
import { momentOf, passAtMoment, workedUntil, type WorkClock } from "@/lib/map-state/work-clock";

/** Times as fast as it was driven. */
const SPEEDS = [60, 300, 1200] as const;

/** Seconds of work that an arrow key moves, and with Shift held or the page keys. */
const STEP_S = 10;
const LONG_STEP_S = 300;

/** The field as it was worked until a moment: played, paused, or moved by hand. */
export function TimeScrubber({ clock, startsPlaying }: { clock: WorkClock; startsPlaying: boolean }) {
  const { store, log } = useBook();
  const timeS = useBookState((state) => state.timeS) ?? momentOf(clock, clock.totalS);
  const [speed, setSpeed] = useState<number>(300);
  const { isPlaying, toggle, pause } = usePlaying(clock, { speed, startsPlaying });
  const showMoment = useShowMoment(clock);
  const workedS = Math.round(workedUntil(clock, timeS));
  const seek = (seconds: number) => {
    pause();
    showMoment(momentOf(clock, seconds));
  };
  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    const by: Record<string, number | undefined> = {
      ArrowLeft: event.shiftKey ? -LONG_STEP_S : -STEP_S,
      ArrowRight: event.shiftKey ? LONG_STEP_S : STEP_S,
      PageDown: -LONG_STEP_S,
      PageUp: LONG_STEP_S,
    };
    const step = by[event.key];
    if (step === undefined && event.key !== " ") return;
    event.preventDefault();
    if (step === undefined) toggle();
    else seek(workedS + step);
  };
  const words = `${clockOf(timeS, log.startedAt)}, pass ${passAtMoment(clock, timeS) ?? ""}`;
  return (
    <div
      role="group"
      aria-label="The field as it was seeded"
      className="flex flex-wrap items-center gap-x-2 text-table"
    >
      <button
        type="button"
        aria-label={isPlaying ? "Pause" : "Play"}
        title={isPlaying ? "Pause" : "Play"}
        onClick={toggle}
        className="grid size-11 place-items-center rounded border border-edge bg-sheet hover:border-ink md:size-8"
      >
        {isPlaying ? <Pause size={16} aria-hidden /> : <Play size={16} aria-hidden />}
      </button>
      <input
        type="range"
        aria-label="Time at work"
        aria-valuetext={words}
        min={0}
        max={Math.ceil(clock.totalS)}
        step={1}
        value={workedS}
        onChange={(event) => seek(event.target.valueAsNumber)}
        onKeyDown={onKeyDown}
        className="h-11 min-w-32 flex-1 accent-ink md:h-8"
      />
      <span className="tabular whitespace-nowrap text-ink-soft" data-testid="moment">
        {words}
      </span>
      <select
        aria-label="How fast"
        value={speed}
        onChange={(event) => setSpeed(Number(event.target.value))}
        className="min-h-11 rounded border border-edge bg-sheet px-1 md:min-h-8"
      >
        {SPEEDS.map((times) => (
          <option key={times} value={times}>
            {times / 60} min a second
          </option>
        ))}
      </select>
      <button
        type="button"
        aria-label="Show all that was seeded"
        title="Show all that was seeded"
        className={buttonClass("quiet", "px-2 md:min-h-8 md:px-2")}
        onClick={() => store.getState().setTime(null)}
      >
        <X size={18} strokeWidth={1.5} aria-hidden />
      </button>
    </div>
  );
}
