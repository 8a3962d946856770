"use client";

import { Play } from "lucide-react";
import dynamic from "next/dynamic";
import { useState, type ReactNode } from "react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { useSeedingClock } from "@/components/field-book/scrubber/use-seeding-clock";
import { momentOf, shareWorked } from "@/lib/map-state/work-clock";
import type { LogOverview } from "@/lib/schemas/logs";

const TimeScrubber = dynamic(() =>
  import("@/components/field-book/scrubber/time-scrubber").then((found) => found.TimeScrubber),
);

/** The strip of the whole field with the button that plays it, and once asked for, the time under it. */
export function SeedingTime({ overview, children }: { overview: LogOverview | undefined; children: ReactNode }) {
  const { store } = useBook();
  const clock = useSeedingClock();
  const timeS = useBookState((state) => state.timeS);
  const [wasAsked, setAsked] = useState(false);
  if (!clock) return children;
  const begin = () => {
    setAsked(true);
    store.getState().setTime(momentOf(clock, 0));
  };
  return (
    <div className="space-y-1">
      <div className="flex items-center gap-2">
        <div className="relative min-w-0 flex-1">
          {children}
          {timeS === null ? null : <StripVeil overview={overview} timeS={timeS} />}
        </div>
        {timeS === null ? (
          <button
            type="button"
            aria-label="Play the field as it was seeded"
            title="Play the field as it was seeded"
            onClick={begin}
            className="no-print grid size-11 shrink-0 place-items-center rounded border border-edge bg-sheet hover:border-ink md:size-9"
          >
            <Play size={16} aria-hidden />
          </button>
        ) : null}
      </div>
      {timeS === null ? null : <TimeScrubber clock={clock} startsPlaying={wasAsked} />}
    </div>
  );
}

/** Covers the passes that were not yet driven. */
function StripVeil({ overview, timeS }: { overview: LogOverview | undefined; timeS: number }) {
  const clock = useSeedingClock();
  if (!overview || !clock) return null;
  const percent = (columns: number) => `${(columns / (overview.columns || 1)) * 100}%`;
  return (
    <svg className="pointer-events-none absolute inset-0 size-full" aria-hidden="true" data-testid="strip-veil">
      {overview.passes.map(({ pass, from, to }) => {
        const worked = from + shareWorked(clock, pass, timeS) * (to - from);
        return worked < to ? (
          <rect key={pass} x={percent(worked)} width={percent(to - worked)} height="100%" fill="#FFFFFF" />
        ) : null;
      })}
    </svg>
  );
}
