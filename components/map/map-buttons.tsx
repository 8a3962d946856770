"use client";

import { Maximize, Minus, Plus } from "lucide-react";
import type { Map as MapLibreMap } from "maplibre-gl";
import type { ReactNode } from "react";

export interface MapButtonsProps {
  map: MapLibreMap;
  onWhole: () => void;
  /** What else can be done with this map. */
  tools?: ReactNode;
}

const GROUP = "flex flex-col divide-y divide-rule rounded border border-edge bg-sheet";

/** Nearer, farther, the whole field, and a map's own tools. Big enough for a thumb. */
export function MapButtons({ map, onWhole, tools }: MapButtonsProps) {
  return (
    <div className="no-print absolute right-3 top-3 z-10 flex flex-col items-end gap-2">
      <div className={GROUP}>
        <MapButton label="Nearer" onClick={() => map.zoomIn({ duration: 120 })}>
          <Plus size={18} aria-hidden />
        </MapButton>
        <MapButton label="Farther" onClick={() => map.zoomOut({ duration: 120 })}>
          <Minus size={18} aria-hidden />
        </MapButton>
        <MapButton label="Whole field" onClick={onWhole}>
          <Maximize size={18} aria-hidden />
        </MapButton>
      </div>
      {tools ? <div className={GROUP}>{tools}</div> : null}
    </div>
  );
}

function MapButton({ label, onClick, children }: { label: string; onClick: () => void; children: ReactNode }) {
  return (
    <button
      type="button"
      aria-label={label}
      title={label}
      onClick={onClick}
      className="grid size-11 place-items-center text-ink -outline-offset-2 hover:bg-paper md:size-9"
    >
      {children}
    </button>
  );
}
