"use client";

import type { FeatureCollection } from "geojson";
import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useMemo } from "react";
import { areasOfKind } from "@/components/coverage/coverage-lines";
import { setGroundOverlay } from "@/components/coverage/ground-overlay";
import { useCoverageAreas, useSwaths } from "@/components/coverage/use-coverage";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { useLimitZones } from "@/components/zones/use-limit-zones";
import type { LimitZoneKind } from "@/lib/schemas/limit-zones";
import type { GroundLayer } from "@/lib/map-state/ground-layers";

/** What of the ground the person wants to see, on the map of the field's book. */
export function useGroundOverlays(map: MapLibreMap | null): void {
  const { logVersion } = useBook();
  const ground = useBookState((state) => state.ground);
  const swaths = useSwaths(logVersion, ground.includes("swaths")).data;
  const areas = useCoverageAreas(logVersion, ground.includes("overlap") || ground.includes("skips")).data;
  const overlap = useMemo(() => (areas ? areasOfKind(areas, "overlap") : undefined), [areas]);
  const skips = useMemo(() => (areas ? areasOfKind(areas, "skip") : undefined), [areas]);
  useOverlay(map, "swaths", ground.includes("swaths") ? (swaths as FeatureCollection | undefined) : undefined);
  useOverlay(map, "overlap", ground.includes("overlap") ? overlap : undefined);
  useOverlay(map, "skips", ground.includes("skips") ? skips : undefined);
  useZoneOverlay(map, "under-target");
  useZoneOverlay(map, "at-limit");
  useZoneOverlay(map, "over-target");
  useZoneOverlay(map, "too-shallow");
}

/** One kind of zones: asked for once it is shown. */
function useZoneOverlay(map: MapLibreMap | null, kind: LimitZoneKind): void {
  const isShown = useBookState((state) => state.ground.includes(kind));
  const zones = useLimitZones(useLogVersion(), kind, isShown).data;
  useOverlay(map, kind, isShown ? (zones as FeatureCollection | undefined) : undefined);
}

function useOverlay(map: MapLibreMap | null, layer: GroundLayer, areas: FeatureCollection | undefined): void {
  useEffect(() => {
    if (!map || !areas) return;
    setGroundOverlay(map, layer, areas);
    return () => {
      // A map that is gone has taken its layers along.
      if (map.getCanvas().isConnected) setGroundOverlay(map, layer, null);
    };
  }, [map, layer, areas]);
}
