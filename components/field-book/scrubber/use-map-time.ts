"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect } from "react";
import { useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { useTileJson } from "@/components/field-book/use-log-data";
import { hideAfter, showUntil } from "@/components/map/time-mask";

/** The map shows only what was worked until the time looked at; tiles of times come once, and every moment recolours them. */
export function useMapTime(map: MapLibreMap | null): void {
  const logVersion = useLogVersion();
  const timeS = useBookState((state) => state.timeS);
  const isOn = timeS !== null;
  const { data: tileJson } = useTileJson(logVersion, "time", isOn);
  useEffect(() => {
    if (map && tileJson && timeS !== null) showUntil(map, tileJson, timeS);
  }, [map, tileJson, timeS]);
  useEffect(() => {
    if (!map || !isOn) return;
    return () => {
      // A map that is gone has nothing to take away.
      if (map.getCanvas().isConnected) hideAfter(map);
    };
  }, [map, isOn, tileJson]);
}
