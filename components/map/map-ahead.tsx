"use client";

import { useEffect } from "react";
import { loadMapLibre } from "@/components/map/load-maplibre";

/** On a page that will show a map: fetches the map library while everything else is still asked for. */
export function MapAhead() {
  useEffect(() => {
    // A map says itself that it could not be opened.
    loadMapLibre().catch(() => undefined);
  }, []);
  return null;
}
