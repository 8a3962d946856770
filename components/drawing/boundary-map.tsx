"use client";

import { Move, Pencil, Redo2, Trash2, Undo2 } from "lucide-react";
import type { Polygon, Position } from "geojson";
import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useEffectEvent, useMemo, useRef, useState, type RefObject } from "react";
import { useMapGround } from "@/components/field-book/use-map-ground";
import type { Drawing, DrawingState, DrawnShape } from "@/components/drawing/drawing";
import { GoToPlace } from "@/components/drawing/go-to-place";
import { MeasureWords } from "@/components/drawing/measure-words";
import { ToolButton } from "@/components/drawing/tool-button";
import { useDrawing } from "@/components/drawing/use-drawing";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { MapCanvas } from "@/components/map/map-canvas";
import { setOverlay } from "@/components/map/overlay-layers";
import { boundaryOf, outlinesOf } from "@/lib/drawing/boundary-shapes";
import type { Bounds } from "@/lib/map-state/field-book-store";
import type { Boundary } from "@/lib/schemas/geometry";

export interface BoundaryMapProps {
  basemap: BasemapConfig;
  /** The boundary as it is; null for a field without one. */
  start: Boundary | null;
  /** Boundaries of the fields beside it: shown, and corners go onto them. */
  neighbours: readonly Boundary[];
  bounds: Bounds;
  /** What is drawn now, at every change of it. */
  onBoundary: (boundary: Boundary | null) => void;
}

function ringsOf(boundary: Boundary): Position[][] {
  return boundary.type === "Polygon" ? boundary.coordinates : boundary.coordinates.flat();
}

function polygonsOf(shapes: readonly DrawnShape[]): Polygon[] {
  return shapes.flatMap(({ geometry }) => (geometry.type === "Polygon" ? [geometry] : []));
}

/** A boundary drawn corner by corner, and changed by dragging its corners. */
export function BoundaryMap({ basemap, start, neighbours, bounds, onBoundary }: BoundaryMapProps) {
  const [map, setMap] = useState<MapLibreMap | null>(null);
  const outlines = useMemo(() => (start ? outlinesOf(start) : []), [start]);
  const guides = useMemo(
    () => [...neighbours, ...(start && outlines === null ? [start] : [])].flatMap(ringsOf),
    [neighbours, start, outlines],
  );
  useMapGround(map, { bounds, boundary: null });
  useEffect(() => {
    if (map) setOverlay(map, "boundary", { type: "MultiLineString", coordinates: guides });
  }, [map, guides]);
  const { state, drawing } = useDrawing(map, {
    start: outlines ?? [],
    mode: outlines && outlines.length > 0 ? "select" : "polygon",
    guides,
    // Drawn is not yet right: the next move is at a corner.
    onFinish: ({ id }) => setTimeout(() => drawing.current?.select(id)),
  });
  const tell = useEffectEvent(onBoundary);
  const told = useRef(JSON.stringify(boundaryOf(outlines ?? [])));
  useEffect(() => {
    // Before the drawing is there, nothing is drawn: that is no change.
    if (!state.canUndo && !state.canRedo && state.shapes.length === 0) return;
    const boundary = boundaryOf(polygonsOf(state.shapes));
    const text = JSON.stringify(boundary);
    if (text === told.current) return;
    told.current = text;
    tell(boundary);
  }, [state]);
  return (
    <div className="overflow-hidden rounded border border-edge bg-sheet" data-testid="boundary-map">
      <Tools state={state} drawing={drawing} />
      <div className="h-[22rem] md:h-[26rem]">
        <MapCanvas
          basemap={basemap}
          bounds={bounds}
          label="Drawing of the boundary"
          description="Each click or tap sets a corner; the first corner again, or Enter, closes the outline. Those who do not draw can choose a file or paste GeoJSON instead."
          onMap={setMap}
        />
      </div>
      <div className="flex flex-wrap items-center justify-between gap-2 border-t border-rule px-3 py-2">
        <p role="status" className="text-table text-ink-soft">
          <StateWords state={state} />
        </p>
        <GoToPlace map={map} />
      </div>
      {outlines === null ? (
        <p className="border-t border-rule px-3 py-2 text-table">
          This boundary has ground cut out of it, which is not drawn here. It is shown as lines; draw it anew, or choose
          a file.
        </p>
      ) : null}
    </div>
  );
}

function Tools({ state, drawing }: { state: DrawingState; drawing: RefObject<Drawing | null> }) {
  const { mode, selectedId, shapes } = state;
  // With one outline there is no doubt which is meant.
  const removable = selectedId ?? (shapes.length === 1 ? (shapes[0]?.id ?? null) : null);
  return (
    <div role="group" aria-label="Drawing tools" className="flex flex-wrap gap-1.5 border-b border-rule p-2">
      <ToolButton pressed={mode === "polygon"} onClick={() => drawing.current?.setMode("polygon")}>
        <Pencil size={15} aria-hidden /> Draw
      </ToolButton>
      <ToolButton pressed={mode === "select"} onClick={() => drawing.current?.setMode("select")}>
        <Move size={15} aria-hidden /> Move corners
      </ToolButton>
      <ToolButton disabled={!state.canUndo} onClick={() => drawing.current?.undo()}>
        <Undo2 size={15} aria-hidden /> Undo
      </ToolButton>
      <ToolButton disabled={!state.canRedo} onClick={() => drawing.current?.redo()}>
        <Redo2 size={15} aria-hidden /> Redo
      </ToolButton>
      <ToolButton disabled={removable === null} onClick={() => removable && drawing.current?.remove(removable)}>
        <Trash2 size={15} aria-hidden /> Take away
      </ToolButton>
    </div>
  );
}

function StateWords({ state }: { state: DrawingState }) {
  if (state.open) return <MeasureWords geometry={state.open} isOpen />;
  const [first, ...others] = polygonsOf(state.shapes);
  if (!first) return <>Click or tap the corners in turn; close the outline at its first corner.</>;
  if (others.length > 0) return <>{others.length + 1} outlines</>;
  return <MeasureWords geometry={first} />;
}
