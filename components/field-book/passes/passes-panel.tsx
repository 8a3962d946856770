"use client";

import { useState } from "react";
import { useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { GroupCharts } from "@/components/field-book/passes/group-charts";
import { PassChart } from "@/components/field-book/passes/pass-chart";
import { RampChart } from "@/components/field-book/passes/ramp-chart";
import { rampWords } from "@/components/field-book/passes/ramp-words";
import { usePassStatistics, useRamps } from "@/components/field-book/passes/use-pass-figures";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { describeFailure } from "@/lib/api/api-problem";
import { channelWords } from "@/lib/legend/channel-words";
import type { PassStatisticsBody, RampsBody } from "@/lib/schemas/pass-figures";

const VIEWS = {
  passes: "Pass by pass",
  groups: "Direction, headland, speed, turns",
  ramps: "Starts and ends",
} as const;
export type PassesView = keyof typeof VIEWS;
const VIEW_NAMES = Object.keys(VIEWS) as PassesView[];

/** Passes compared: each by itself, by the way they were driven, and by their first and last metres. */
export function PassesPanel({ onTable }: { onTable: () => void }) {
  const [view, setView] = useState<PassesView>("passes");
  const version = useLogVersion();
  const channel = useBookState((state) => state.channel);
  const statistics = usePassStatistics(version, channel);
  const ramps = useRamps(version, channel);
  const asked = view === "ramps" ? ramps : statistics;
  return (
    <section aria-labelledby="passes-title" className="flex h-full min-h-0 flex-col gap-1 px-4 pb-2 pt-1">
      <div className="flex items-center justify-between gap-2">
        <h2 id="passes-title" className="sr-only">
          Passes
        </h2>
        <label className="min-w-0 text-table">
          <span className="sr-only">What to show of the passes</span>
          <select
            value={view}
            onChange={(event) => {
              const chosen = VIEW_NAMES.find((name) => name === event.target.value);
              if (chosen) setView(chosen);
            }}
            className="min-h-11 max-w-full rounded border border-edge bg-sheet px-2 md:min-h-8"
          >
            {VIEW_NAMES.map((name) => (
              <option key={name} value={name}>
                {VIEWS[name]}
              </option>
            ))}
          </select>
        </label>
        <button
          type="button"
          onClick={onTable}
          className="min-h-11 whitespace-nowrap px-1 text-slate underline md:min-h-0"
        >
          As a table
        </button>
      </div>
      {asked.isError ? (
        <p role="alert" className="text-table text-ink-soft">
          {describeFailure(asked.error)}
        </p>
      ) : (
        <View view={view} statistics={statistics.data} ramps={ramps.data} />
      )}
    </section>
  );
}

interface ViewProps {
  view: PassesView;
  statistics: PassStatisticsBody | undefined;
  ramps: RampsBody | undefined;
}

function View({ view, statistics, ramps }: ViewProps) {
  const body = view === "ramps" ? ramps : statistics;
  return (
    <>
      <p className="text-table text-ink-soft">
        {body ? `${channelWords(body.channel).name}. ` : ""}
        <ViewWords view={view} ramps={ramps} />
      </p>
      <div data-figure="passes" className="h-96 lg:h-auto lg:min-h-0 lg:flex-1">
        {!body ? <div className="hatch h-full opacity-60" role="status" aria-label="Comparing the passes" /> : null}
        {view === "passes" && statistics ? <PassChart statistics={statistics} /> : null}
        {view === "groups" && statistics ? <GroupCharts statistics={statistics} /> : null}
        {view === "ramps" && ramps && ramps.reachM > 0 ? <RampChart key={ramps.reachM} ramps={ramps} /> : null}
      </div>
    </>
  );
}

function ViewWords({ view, ramps }: Pick<ViewProps, "view" | "ramps">) {
  const units = useChannelUnits(ramps?.unit ?? "1", ramps?.channel ?? "");
  const distance = useChannelUnits("m", "distance");
  if (view === "passes") return <>In the order driven: median, middle half, 5th to 95th percentile. White: headland.</>;
  if (view === "groups" || !ramps) return null;
  return <>{rampWords(ramps, { value: units.format, distance: distance.format })}</>;
}
