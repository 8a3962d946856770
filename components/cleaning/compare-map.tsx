"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useState } from "react";
import { hideReasons, registerReasonTiles, showReasons } from "@/components/cleaning/reason-layer";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import type { Classes } from "@/components/field-book/use-classes";
import { useTileJson } from "@/components/field-book/use-log-data";
import { useMapGround } from "@/components/field-book/use-map-ground";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { FIRST_LAYER_OVER_VALUES } from "@/components/map/overlay-layers";
import { TitledMap } from "@/components/map/titled-map";
import { colourExpression, showValues } from "@/components/map/value-layer";
import { channelWords } from "@/lib/legend/channel-words";
import type { Bounds } from "@/lib/map-state/field-book-store";
import type { Boundary } from "@/lib/schemas/geometry";

export interface CompareMapProps {
  title: string;
  /** With the rules in force, or the log as it was read. */
  cleaned: boolean;
  basemap: BasemapConfig;
  bounds: Bounds;
  boundary: Boundary | null;
  classes: Classes | null;
  onMap: (map: MapLibreMap | null) => void;
}

/** One of the two maps: the readings, and with the rules also where some were left out, and why. */
export function CompareMap({ title, cleaned, basemap, bounds, boundary, classes, onMap }: CompareMapProps) {
  const { logVersion } = useBook();
  const channel = useBookState((state) => state.channel);
  const [map, setMap] = useState<MapLibreMap | null>(null);
  const values = useTileJson({ ...logVersion, cleaned }, channel);
  const reasons = useTileJson(logVersion, "flags", cleaned);
  const tileJson = values.data;
  useMapGround(map, { bounds, boundary });
  useEffect(() => {
    if (!map || !tileJson || !classes || classes.context.channel !== tileJson.encoding.channel) return;
    const colour = colourExpression(classes.edges, classes.colours, tileJson.encoding);
    showValues(map, { tileJson, colour, beforeLayer: map.getLayer("reasons") ? "reasons" : FIRST_LAYER_OVER_VALUES });
  }, [map, tileJson, classes]);
  const reasonTiles = reasons.data;
  useEffect(() => {
    if (!map || !reasonTiles || !cleaned) return;
    let isGone = false;
    void registerReasonTiles().then(() => {
      if (!isGone) showReasons(map, reasonTiles);
    });
    return () => {
      isGone = true;
      if (map.getCanvas().isConnected) hideReasons(map);
    };
  }, [map, reasonTiles, cleaned]);
  return (
    <TitledMap
      title={title}
      isTrouble={values.isError || reasons.isError}
      basemap={basemap}
      bounds={bounds}
      label={`Map, ${title.toLowerCase()}`}
      description={`${channelWords(channel).name}, ${title.toLowerCase()}, north up. The table above gives the difference in numbers.`}
      onMap={(ready) => {
        setMap(ready);
        onMap(ready);
      }}
    />
  );
}
