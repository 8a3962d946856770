"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect } from "react";
import { addAtlasWhenWide, drawGrid } from "@/components/map/map-grid";
import { setOverlay } from "@/components/map/overlay-layers";
import { useUnits } from "@/components/units/use-units";
import type { Bounds } from "@/lib/map-state/field-book-store";
import type { Boundary } from "@/lib/schemas/geometry";
import { displayUnit } from "@/lib/units/display-unit";

export interface MapGround {
  bounds: Bounds;
  boundary: Boundary | null;
}

/** Boundary, grid and atlas, in the person's units. */
export function useMapGround(map: MapLibreMap | null, { bounds, boundary }: MapGround): void {
  const { system } = useUnits();
  const [west, south] = bounds;
  useEffect(() => {
    if (map) setOverlay(map, "boundary", boundary);
  }, [map, boundary]);
  useEffect(() => {
    if (!map) return;
    const { factor, symbol } = displayUnit("m", system, "distance");
    const draw = () => {
      drawGrid(map, [west, south], { unitM: factor, unitSign: symbol });
      addAtlasWhenWide(map);
    };
    draw();
    map.on("moveend", draw);
    map.on("resize", draw);
    return () => {
      map.off("moveend", draw);
      map.off("resize", draw);
    };
  }, [map, system, west, south]);
}
