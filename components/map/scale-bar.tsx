"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useState } from "react";
import { useUnits } from "@/components/units/use-units";
import { chooseScaleBar, type ScaleBarLength } from "@/lib/map-state/scale-bar";
import { worldPerMetre } from "@/lib/tiles/tile-address";

const MOST_PX = 110;

/** A round distance at the middle of the map, in the person's units. North is up. */
export function ScaleBar({ map }: { map: MapLibreMap }) {
  const { system } = useUnits();
  const [bar, setBar] = useState<ScaleBarLength | null>(null);
  useEffect(() => {
    const measure = () => {
      const pixelsPerM = worldPerMetre(map.getCenter().lat).east * 512 * 2 ** map.getZoom();
      setBar(chooseScaleBar(pixelsPerM, MOST_PX, system));
    };
    measure();
    map.on("move", measure);
    return () => {
      map.off("move", measure);
    };
  }, [map, system]);
  if (!bar) return null;
  return (
    <div className="tabular pointer-events-none absolute bottom-7 right-3 z-10 bg-sheet/85 px-1.5 pb-1 text-[11px] leading-4 text-ink">
      {bar.text}
      <span className="sr-only"> scale, north up</span>
      <div className="h-1.5 border-x border-b border-ink" style={{ width: bar.widthPx }} />
    </div>
  );
}
