"use client";

import { useMemo, useRef, useState } from "react";
import { useBookState } from "@/components/field-book/field-book-context";
import { DistanceAxis, RowAxis } from "@/components/field-book/pass-axes";
import { PassMarks } from "@/components/field-book/pass-marks";
import type { PassOrientation, PassScale } from "@/components/field-book/pass-scale";
import { PictureCanvas } from "@/components/field-book/picture-canvas";
import { Readout } from "@/components/field-book/readout";
import type { Classes } from "@/components/field-book/use-classes";
import { usePassKeys } from "@/components/field-book/use-pass-keys";
import { usePassPointer } from "@/components/field-book/use-pass-pointer";
import { useSize } from "@/components/field-book/use-size";
import { useTracksAtHand } from "@/components/field-book/use-tracks-at-hand";
import { channelWords } from "@/lib/legend/channel-words";
import { gridOfPass, paintGrid, turnUpright } from "@/lib/map-state/paint-pass";
import type { PassTrack } from "@/lib/map-state/pass-track";

export interface UnrolledPassProps {
  track: PassTrack | undefined;
  classes: Classes | null;
  passes: readonly number[];
  /** Rows that stand out from the others. */
  flagged: number[];
  orientation: PassOrientation;
}

/** One pass straightened: a cell a reading, rows side by side, distance along it. Linked both ways with the map. */
export function UnrolledPass({ track, classes, passes, flagged, orientation }: UnrolledPassProps) {
  const plot = useRef<HTMLDivElement>(null);
  const { width, height } = useSize(plot);
  const [spoken, setSpoken] = useState(false);
  const row = useBookState((state) => state.row);
  const rows = track?.rows ?? 1;
  const scale: PassScale = { orientation, width, height, lengthM: track?.lengthM ?? 0, rows };
  const across = orientation === "across";
  useTracksAtHand(across);
  const picture = usePassPicture({ track, classes, alongPx: across ? width : height, across });
  const pointer = usePassPointer(track, scale);
  const onKeyDown = usePassKeys(track, passes, () => setSpoken(true));
  const label = track
    ? `Unrolled pass ${track.pass}: ${channelWords(track.channel).name}, ${rows} rows, ${track.records} readings a row`
    : "Unrolled pass";
  const plotBox = (
    <div
      ref={plot}
      tabIndex={0}
      role="group"
      aria-roledescription="chart"
      aria-label={`${label}. Arrow keys move from reading to reading, brackets change the pass.`}
      data-testid="unrolled-plot"
      onKeyDown={onKeyDown}
      {...pointer}
      onPointerEnter={() => setSpoken(false)}
      className="hatch relative min-h-0 min-w-0 cursor-crosshair select-none border border-edge bg-sheet"
    >
      <PictureCanvas picture={picture} label={label} />
      {track && width > 0 ? <PassMarks track={track} scale={scale} /> : null}
    </div>
  );
  if (!across) {
    return (
      <div>
        <Readout spoken={spoken} />
        <div data-figure="unrolled-pass">
          <RowAxis scale={scale} selected={row} flagged={flagged} />
          <div className="grid h-[36rem] grid-cols-[2.75rem_1fr]">
            <DistanceAxis scale={scale} />
            {plotBox}
          </div>
        </div>
      </div>
    );
  }
  return (
    <div className="flex h-full min-h-0 flex-col">
      <Readout spoken={spoken} />
      <div data-figure="unrolled-pass" className="grid min-h-0 flex-1 grid-cols-[2.25rem_1fr] grid-rows-[1fr_1.25rem]">
        <RowAxis scale={scale} selected={row} flagged={flagged} />
        {plotBox}
        <span aria-hidden="true" className="pt-0.5 text-right text-[11px] leading-4 text-ink-soft" />
        <DistanceAxis scale={scale} />
      </div>
    </div>
  );
}

interface PictureOptions {
  track: PassTrack | undefined;
  classes: Classes | null;
  alongPx: number;
  across: boolean;
}

/** The pass painted at the resolution of the screen. Pointing never paints it again. */
function usePassPicture({ track, classes, alongPx, across }: PictureOptions) {
  const columns = Math.round(alongPx * (typeof window === "undefined" ? 1 : Math.min(2, window.devicePixelRatio)));
  const grid = useMemo(() => (track && columns > 0 ? gridOfPass(track, columns) : null), [track, columns]);
  return useMemo(() => {
    if (!grid || !classes || classes.context.channel !== track?.channel) return null;
    const picture = paintGrid(grid, classes.edges, classes.colours);
    return across ? picture : turnUpright(picture);
  }, [grid, classes, across, track?.channel]);
}
