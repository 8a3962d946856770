"use client";

import type { Position } from "geojson";
import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useEffectEvent, useRef, useState } from "react";
import {
  NOTHING_DRAWN,
  type Drawing,
  type DrawingMode,
  type DrawingState,
  type DrawnShape,
  type ShapeGeometry,
} from "@/components/drawing/drawing";

export interface UseDrawingOptions {
  /** Only the first values count. */
  start: readonly ShapeGeometry[];
  mode: DrawingMode;
  guides: readonly Position[][];
  onFinish?: (shape: DrawnShape) => void;
}

/** A drawing on a map for as long as the component lives; the package that draws is fetched with it. */
export function useDrawing(map: MapLibreMap | null, options: UseDrawingOptions) {
  const [state, setState] = useState<DrawingState>(NOTHING_DRAWN);
  const drawing = useRef<Drawing | null>(null);
  const opening = useRef(options);
  const onFinish = useEffectEvent((shape: DrawnShape) => options.onFinish?.(shape));
  useEffect(() => {
    if (!map) return;
    let isGone = false;
    const { start, mode, guides } = opening.current;
    void import("@/components/drawing/create-drawing").then(({ createDrawing }) => {
      if (isGone) return;
      drawing.current = createDrawing({ map, start, mode, guides, onChange: setState, onFinish });
    });
    return () => {
      isGone = true;
      drawing.current?.stop();
      drawing.current = null;
    };
  }, [map]);
  return { state, drawing };
}
