"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useId, useState } from "react";
import { ToolButton } from "@/components/drawing/tool-button";
import { readPlace } from "@/lib/drawing/read-place";

/** Close enough to draw a field. */
const FIELD_ZOOM = 15;

/** Takes a map to a place given in degrees: the way to ground that nothing on the map shows yet. */
export function GoToPlace({ map }: { map: MapLibreMap | null }) {
  const id = useId();
  const [text, setText] = useState("");
  const [isWrong, setWrong] = useState(false);
  const go = () => {
    const place = readPlace(text);
    setWrong(place === null);
    if (place && map) map.jumpTo({ center: place, zoom: Math.max(FIELD_ZOOM, map.getZoom()) });
  };
  return (
    <div>
      <div className="flex items-center gap-1.5">
        <label htmlFor={id} className="text-table text-ink-soft">
          Latitude, longitude
        </label>
        <input
          id={id}
          value={text}
          inputMode="text"
          placeholder="38.41, -98.61"
          aria-invalid={isWrong}
          aria-describedby={isWrong ? `${id}-wrong` : undefined}
          onChange={(event) => setText(event.target.value)}
          onKeyDown={(event) => {
            // The form around it is not meant.
            if (event.key !== "Enter") return;
            event.preventDefault();
            go();
          }}
          className="tabular min-h-11 w-36 rounded border border-edge bg-sheet px-2 text-table md:min-h-8"
        />
        <ToolButton onClick={go}>Go there</ToolButton>
      </div>
      {isWrong ? (
        <p id={`${id}-wrong`} role="alert" className="text-table text-clay">
          Two numbers in degrees, latitude first, such as 38.41, -98.61.
        </p>
      ) : null}
    </div>
  );
}
