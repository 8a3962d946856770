"use client";

import { useEffect, useState, type ReactNode } from "react";
import { CleanedSwitch } from "@/components/cleaning/cleaned-switch";
import { CleaningLink } from "@/components/cleaning/cleaning-link";
import { CoveragePanel } from "@/components/coverage/coverage-panel";
import { ChannelSwitch } from "@/components/field-book/channel-switch";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { ComparedLegends, ComparedPasses, ComparisonLine } from "@/components/field-book/compare/compared";
import { MapArea } from "@/components/field-book/compare/map-area";
import { FieldStrip } from "@/components/field-book/field-strip";
import { ShowOnMap } from "@/components/field-book/keys/show-on-map";
import { Legend } from "@/components/field-book/legend";
import { PassPicture } from "@/components/pictures/book-figures";
import { openingBounds } from "@/components/field-book/opening-bounds";
import { PassHeading } from "@/components/field-book/pass-heading";
import { SeedingTime } from "@/components/field-book/scrubber/seeding-time";
import { SidePanel, SideTable, type SideTableName } from "@/components/field-book/side-panel";
import { UnrolledPass } from "@/components/field-book/unrolled-pass";
import { useClasses } from "@/components/field-book/use-classes";
import {
  useLogVerdict,
  useOverview,
  usePasses,
  useRowStatistics,
  useTrack,
} from "@/components/field-book/use-log-data";
import { useWideScreen } from "@/components/field-book/use-wide-screen";
import { VerdictPanel } from "@/components/field-book/verdict-panel";
import type { BasemapConfig } from "@/components/map/basemap-config";
import type { Bounds } from "@/lib/map-state/field-book-store";
import type { Field } from "@/lib/schemas/fields";
import type { PassBody } from "@/lib/schemas/logs";

export interface RowsLayoutProps {
  field: Field;
  basemap: BasemapConfig;
  picker: ReactNode;
  /** Address of the field's list of logs. */
  logsHref: string;
}

/** Fills the window under the header on a wide screen; flows down on a phone. */
const WIDE_FRAME = "grid h-[calc(100dvh-3.5rem)] min-h-[38rem] grid-cols-[minmax(0,1fr)_24rem] md:-mb-10";

/** Map above, unrolled pass beneath, verdict and line-up at the right; on a phone the verdict first and the pass upright at the end. */
export function RowsLayout({ field, basemap, picker, logsHref }: RowsLayoutProps) {
  const wide = useWideScreen();
  const parts = useParts({ field, basemap, wide: wide === true, logsHref });
  if (wide === null) return <RowsSkeleton />;
  if (!wide) return <NarrowRows parts={parts} picker={picker} />;
  return (
    <div className={WIDE_FRAME}>
      <div className="relative grid min-h-0 min-w-0 grid-rows-[auto_minmax(0,1fr)_auto_minmax(13rem,34%)]">
        <div className="border-b border-rule px-4 py-2">
          <div className="flex items-center justify-between gap-4">
            <ChannelSwitch />
            {picker}
          </div>
          <CleanedSwitch />
          <ComparisonLine />
        </div>
        <div className="min-h-0 border-b border-rule">{parts.map}</div>
        <div className="border-b border-rule px-4 py-2">{parts.legend}</div>
        <div className="grid min-h-0 grid-rows-[auto_minmax(0,1fr)_auto] gap-1 px-4 pb-2 pt-1">
          {parts.passHeading}
          {parts.pass("across")}
          <div className="grid grid-cols-[2.25rem_1fr] items-center">
            <span className="text-[11px] leading-3 text-ink-soft">Field</span>
            {parts.strip}
          </div>
        </div>
        {parts.table ? <div className="absolute inset-0 z-20">{parts.table}</div> : null}
      </div>
      <div className="grid min-h-0 grid-rows-[minmax(0,1fr)_27rem] divide-y divide-rule border-l border-rule bg-sheet">
        <div className="divide-y divide-rule overflow-y-auto">
          {parts.verdict}
          {parts.coverage}
        </div>
        {parts.lineUp}
      </div>
    </div>
  );
}

function NarrowRows({ parts, picker }: { parts: Parts; picker: ReactNode }) {
  return (
    <div className="divide-y divide-rule">
      <div className="bg-sheet">{parts.verdict}</div>
      <div className="space-y-2 px-4 py-3">
        {picker}
        <ChannelSwitch />
        <CleanedSwitch />
        <ComparisonLine />
      </div>
      <div className="h-[26rem]">{parts.map}</div>
      <div className="px-4 py-3">{parts.legend}</div>
      <div className="bg-sheet">{parts.table ?? parts.lineUp}</div>
      <div className="bg-sheet">{parts.coverage}</div>
      <div className="px-4 py-3">
        {parts.passHeading}
        <div className="py-2">{parts.strip}</div>
        {parts.pass("upright")}
      </div>
    </div>
  );
}

type Parts = ReturnType<typeof useParts>;

interface PartsOptions extends Pick<RowsLayoutProps, "field" | "basemap" | "logsHref"> {
  wide: boolean;
}

/** Everything the page shows, fed with the open log; where it goes depends on the screen. */
function useParts({ field, basemap, wide, logsHref }: PartsOptions) {
  const { log } = useBook();
  const logVersion = useLogVersion();
  const channel = useBookState((state) => state.channel);
  const [openTable, setOpenTable] = useState<SideTableName | null>(null);
  const { data: passes = [] } = usePasses(logVersion);
  const { data: overview } = useOverview(logVersion, channel);
  const { data: statistics } = useRowStatistics(logVersion, channel);
  const verdict = useLogVerdict(logVersion, log.kind !== "harvest");
  const track = useChosenTrack(passes);
  const classes = useClasses(channel, overview);
  const current = statistics?.channel === channel ? statistics : undefined;
  const flagged = (current?.items ?? []).filter((item) => item.flagged).map((item) => item.row);
  const [bounds] = useState<Bounds>(() => openingBounds(field, log));
  return {
    map: (
      <MapArea
        basemap={basemap}
        bounds={bounds}
        boundary={field.boundary}
        classes={classes}
        track={track}
        gentle={!wide}
      />
    ),
    legend: (
      <ComparedLegends classes={classes}>
        <Legend classes={classes} unit={overview?.unit ?? ""} />
      </ComparedLegends>
    ),
    verdict: (
      <VerdictPanel
        verdict={verdict.data}
        rows={log.counts.rows}
        trouble={verdict.isError}
        logsHref={logsHref}
        openFirst={wide}
      />
    ),
    coverage: (
      <>
        <CoveragePanel />
        <CleaningLink logsHref={logsHref} />
      </>
    ),
    lineUp: <SidePanel statistics={statistics} classes={classes} onTable={setOpenTable} />,
    table: openTable ? <SideTable name={openTable} statistics={statistics} onClose={() => setOpenTable(null)} /> : null,
    passHeading: (
      <PassHeading
        passes={passes}
        tools={
          <>
            <ShowOnMap />
            <PassPicture classes={classes} />
          </>
        }
      />
    ),
    strip: (
      <SeedingTime overview={overview}>
        <FieldStrip overview={overview} classes={classes} />
      </SeedingTime>
    ),
    pass: (orientation: "across" | "upright") => (
      <ComparedPasses firstClasses={classes} orientation={orientation}>
        <UnrolledPass
          track={track}
          classes={classes}
          passes={passes.map(({ pass }) => pass)}
          flagged={flagged}
          orientation={orientation}
        />
      </ComparedPasses>
    ),
  };
}

/** The readings of the chosen pass; until somebody chooses one, the longest inside the field. */
function useChosenTrack(passes: readonly PassBody[]) {
  const { store } = useBook();
  const logVersion = useLogVersion();
  const channel = useBookState((state) => state.channel);
  const pass = useBookState((state) => state.pass);
  const opening = openingPass(passes);
  const known = pass !== null && (passes.length === 0 || passes.some((candidate) => candidate.pass === pass));
  useEffect(() => {
    if (!known && opening !== undefined) store.getState().choosePass(opening);
  }, [store, known, opening]);
  return useTrack(logVersion, channel, pass).data;
}

function openingPass(passes: readonly PassBody[]): number | undefined {
  const inside = passes.filter((pass) => !pass.headland);
  const byLength = (inside.length > 0 ? inside : [...passes]).toSorted((a, b) => b.lengthM - a.lengthM);
  return byLength[0]?.pass;
}

/** The page's frame while nothing is known yet: same places, nothing jumps. */
export function RowsSkeleton() {
  return (
    <div
      role="status"
      aria-label="Opening the field's book"
      className="lg:grid lg:h-[calc(100dvh-3.5rem)] lg:grid-cols-[minmax(0,1fr)_24rem] md:-mb-10"
    >
      <div className="grid max-lg:h-[40rem] lg:grid-rows-[3.1rem_minmax(0,1fr)_6rem_minmax(13rem,34%)]">
        <span className="border-b border-rule max-lg:hidden" />
        <span className="hatch border-b border-rule opacity-60" />
        <span className="border-b border-rule" />
        <span className="hatch m-4 opacity-60" />
      </div>
      <div className="border-l border-rule bg-sheet max-lg:hidden" />
    </div>
  );
}
