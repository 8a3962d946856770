"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useState } from "react";
import { Divider } from "@/components/field-book/compare/divider";
import { saySide } from "@/components/field-book/compare/say-side";
import { InSecondBook, useSecondBook } from "@/components/field-book/compare/second-book";
import { useSecondData } from "@/components/field-book/compare/use-second-data";
import { usePlacesAcrossLogs } from "@/components/field-book/compare/use-places-across-logs";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { RowMap, type RowMapProps } from "@/components/field-book/row-map";
import { classNames } from "@/components/ui/class-names";
import { lockMaps } from "@/components/map/lock-maps";
import type { CompareMode } from "@/lib/map-state/comparison";

export interface SecondMapProps extends RowMapProps {
  mode: CompareMode;
  firstMap: MapLibreMap | null;
}

const BESIDE =
  "absolute inset-x-0 bottom-0 h-1/2 border-t border-ink md:inset-y-0 md:left-1/2 md:right-0 md:h-auto md:border-l md:border-t-0";

/** The other side of a comparison: clipped at a divider, or in a pane of its own. Both maps move as one. */
export function SecondMap({ mode, firstMap, ...props }: SecondMapProps) {
  const book = useBook();
  const second = useSecondBook();
  const { log } = book;
  const channel = useBookState((state) => state.channel);
  const otherChannel = useBookState((state) => state.comparison?.channel ?? state.channel);
  const other = second?.log ?? log;
  const [atPercent, setAtPercent] = useState(50);
  const [map, setMap] = useState<MapLibreMap | null>(null);
  useLockedMaps(firstMap, map);
  usePlacesAcrossLogs(book, second);
  const isSwipe = mode === "swipe";
  const names: [string, string] = [saySide(channel, log, other), saySide(otherChannel, other, log)];
  return (
    <>
      <div
        data-testid="second-map"
        className={isSwipe ? "absolute inset-0" : BESIDE}
        style={isSwipe ? { clipPath: `inset(0 0 0 ${atPercent}%)` } : undefined}
      >
        <InSecondBook>
          <OtherSide {...props} label={`Second map, ${names[1]}`} onMap={setMap} />
        </InSecondBook>
        <SideName name={names[1]} place={isSwipe ? "right-16" : "left-3"} />
      </div>
      <SideName name={names[0]} place="left-3" />
      {isSwipe ? <Divider atPercent={atPercent} onMove={setAtPercent} sides={names} /> : null}
    </>
  );
}

function OtherSide({ classes: firstClasses, ...props }: RowMapProps) {
  const { classes, track } = useSecondData(firstClasses);
  return <RowMap {...props} classes={classes} track={track} hasTapSheet={false} />;
}

function SideName({ name, place }: { name: string; place: string }) {
  return (
    <p
      className={classNames(
        "pointer-events-none absolute top-3 max-w-[45%] truncate border border-edge bg-sheet px-2 py-0.5 text-table font-semibold",
        place,
      )}
    >
      {name}
    </p>
  );
}

/** From now on the two move as one, the second beginning where the first is. */
function useLockedMaps(first: MapLibreMap | null, second: MapLibreMap | null): void {
  useEffect(() => {
    if (!first || !second) return;
    second.jumpTo({ center: first.getCenter(), zoom: first.getZoom() });
    return lockMaps(first, second);
  }, [first, second]);
}
