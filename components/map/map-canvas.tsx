"use client";

import "maplibre-gl/dist/maplibre-gl.css";
import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useId, useRef, useState, type ReactNode } from "react";
import { chooseStyle } from "@/components/map/base-style";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { loadMapLibre } from "@/components/map/load-maplibre";
import { MapButtons } from "@/components/map/map-buttons";
import { ScaleBar } from "@/components/map/scale-bar";
import { addOverlays } from "@/components/map/overlay-layers";
import type { Bounds, MapView } from "@/lib/map-state/field-book-store";

export interface MapCanvasProps {
  basemap: BasemapConfig;
  /** What it is called where there are several. */
  label?: string;
  /** Where the map opens; it never moves by itself afterwards. */
  bounds: Bounds;
  view?: MapView | null;
  /** Read to those who cannot see the map: what it shows and where the same is written in words. */
  description: string;
  /** Called with the map once it can be drawn on, and with null when it is gone. */
  onMap: (map: MapLibreMap | null) => void;
  /** On a page that scrolls: one finger scrolls the page, two move the map. */
  gentle?: boolean;
  /** For looking and printing: gentle, and what is drawn can be printed. */
  readOnly?: boolean;
  /** Further buttons beside the map's own. */
  tools?: ReactNode;
  /** The name pictures of this map go by. */
  figure?: string;
  children?: ReactNode;
}

const FIT_PADDING_PX = 28;

/** A map with our ground, buttons and keys. What lies on it is drawn by whoever gets it through `onMap`. */
export function MapCanvas(props: MapCanvasProps) {
  const { bounds, description, label = "Map", tools, figure, children } = props;
  const wordsId = useId();
  const container = useRef<HTMLDivElement>(null);
  const [map, setMap] = useState<MapLibreMap | null>(null);
  const [trouble, setTrouble] = useState(false);
  // Only the first values count: the map never moves because a parent was drawn again.
  const opening = useRef(props);
  useEffect(() => {
    const start = opening.current;
    let gone = false;
    let made: MapLibreMap | null = null;
    let stopRefitting: (() => void) | null = null;
    openMap(container.current!, start).then(
      (ready) => {
        if (gone) return ready.remove();
        made = ready;
        if (start.readOnly) stopRefitting = refitWhenResized(ready, start.bounds);
        setMap(ready);
        start.onMap(ready);
      },
      () => setTrouble(true),
    );
    return () => {
      gone = true;
      start.onMap(null);
      stopRefitting?.();
      made?.remove();
    };
  }, []);
  return (
    <div data-figure={figure} className="relative h-full min-h-0 overflow-hidden bg-sheet">
      <div className="absolute inset-0">
        <div ref={container} role="region" aria-label={label} aria-describedby={wordsId} className="size-full" />
      </div>
      <p id={wordsId} className="sr-only">
        {description}
      </p>
      {trouble ? (
        <p className="absolute inset-x-6 top-6 text-ink-soft" role="alert">
          This browser cannot draw the map (it has no WebGL 2). The unrolled pass and the line-up show the same
          readings.
        </p>
      ) : null}
      {map ? (
        <>
          <ScaleBar map={map} />
          <MapButtons map={map} onWhole={() => fitBounds(map, bounds)} tools={tools} />
        </>
      ) : null}
      {children}
    </div>
  );
}

/** Shows bounds at once, without flying. */
export function fitBounds(map: MapLibreMap, bounds: Bounds): void {
  map.fitBounds(bounds, { padding: FIT_PADDING_PX, maxZoom: 20, animate: false });
}

/**
 * Keeps the whole of `bounds` in a map that is only looked at: until somebody moves it, every change of its size fits it
 * anew. On paper the picture is kept as it is and scaled (see globals.css): drawing anew takes longer than a printer
 * waits. Answers how to stop.
 */
function refitWhenResized(map: MapLibreMap, bounds: Bounds): () => void {
  let isMoved = false;
  map.on("movestart", (event: { originalEvent?: unknown }) => {
    if (event.originalEvent) isMoved = true;
  });
  const paper = window.matchMedia("print");
  const observer = new ResizeObserver(() => {
    if (paper.matches) return;
    map.resize();
    if (!isMoved) fitBounds(map, bounds);
  });
  observer.observe(map.getContainer());
  return () => observer.disconnect();
}

async function openMap(
  container: HTMLElement,
  { basemap, bounds, view, gentle, readOnly }: MapCanvasProps,
): Promise<MapLibreMap> {
  const [maplibre, style] = await Promise.all([loadMapLibre(), chooseStyle(basemap)]);
  const opening = view
    ? { center: [view.longitude, view.latitude] as [number, number], zoom: view.zoom }
    : { bounds, fitBoundsOptions: { padding: FIT_PADDING_PX } };
  const map = new maplibre.Map({
    container,
    style,
    ...opening,
    maxZoom: 22,
    attributionControl: basemap.styleUrl || basemap.tilesUrl ? { compact: true } : false,
    dragRotate: false,
    pitchWithRotate: false,
    touchPitch: false,
    fadeDuration: 0,
    cooperativeGestures: gentle || readOnly,
    // A map that is only looked at is told of its size by `refitWhenResized`.
    trackResize: !readOnly,
    canvasContextAttributes: { preserveDrawingBuffer: readOnly },
  });
  map.touchZoomRotate.disableRotation();
  map.keyboard.disableRotation();
  map.getCanvas().setAttribute("aria-label", "Map. Arrow keys move it, plus and minus zoom.");
  // Sources can be added from here on; waiting for the first picture would only put off the fetching of tiles.
  await new Promise<void>((resolve) => map.once("style.load", () => resolve()));
  addOverlays(map);
  return map;
}
