"use client";

import { useQuery } from "@tanstack/react-query";
import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useState } from "react";
import { useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { trackQuery } from "@/components/field-book/use-log-data";
import { cellRing } from "@/lib/map-state/pass-cells";

/**
 * Outlines on the map the cell of the reading pointed at. Drawn beside the map rather than on it: a change of a map layer
 * paints the whole map again, far too slow for every move of the pointer.
 */
export function CellMark({ map }: { map: MapLibreMap }) {
  const logVersion = useLogVersion();
  const channel = useBookState((state) => state.channel);
  const cursor = useBookState((state) => state.cursor);
  const { data: track } = useQuery({
    ...trackQuery(logVersion, channel, cursor?.pass ?? 0),
    enabled: cursor !== null,
  });
  useRedrawOnMove(map, cursor !== null);
  if (!cursor || track?.pass !== cursor.pass || cursor.record >= track.records) return null;
  const points = cellRing(track, cursor.record, cursor.row).map((place) => map.project(place as [number, number]));
  const line = points.map(({ x, y }) => `${x.toFixed(1)},${y.toFixed(1)}`).join(" ");
  return (
    <svg className="pointer-events-none absolute inset-0 size-full" aria-hidden="true">
      <polygon points={line} fill="none" stroke="#FFFFFF" strokeWidth={5} strokeLinejoin="round" />
      <polygon points={line} fill="none" stroke="#1E2430" strokeWidth={2} strokeLinejoin="round" />
    </svg>
  );
}

/** Draws the component again while the map moves under it. */
function useRedrawOnMove(map: MapLibreMap, active: boolean): void {
  const [, redraw] = useState(0);
  useEffect(() => {
    if (!active) return;
    const onMove = () => redraw((count) => count + 1);
    map.on("move", onMove);
    return () => {
      map.off("move", onMove);
    };
  }, [map, active]);
}
