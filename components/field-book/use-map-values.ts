"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useRef } from "react";
import { useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import type { Classes } from "@/components/field-book/use-classes";
import { useTileJson } from "@/components/field-book/use-log-data";
import { FIRST_LAYER_OVER_VALUES } from "@/components/map/overlay-layers";
import { colourExpression, recolourValues, showValues } from "@/components/map/value-layer";

/** The channel's tiles in class colours. A change of classes recolours what is there; only a change of channel asks for tiles. */
export function useMapValues(map: MapLibreMap | null, classes: Classes | null): void {
  const logVersion = useLogVersion();
  const channel = useBookState((state) => state.channel);
  const { data: tileJson } = useTileJson(logVersion, channel);
  const shown = useRef<{ map: MapLibreMap; address: string } | null>(null);
  useEffect(() => {
    if (!map || !tileJson || !classes || classes.context.channel !== tileJson.encoding.channel) return;
    const colour = colourExpression(classes.edges, classes.colours, tileJson.encoding);
    const address = tileJson.tiles.join(" ");
    if (shown.current?.map === map && shown.current.address === address) {
      recolourValues(map, colour);
      return;
    }
    showValues(map, { tileJson, colour, beforeLayer: FIRST_LAYER_OVER_VALUES });
    shown.current = { map, address };
  }, [map, tileJson, classes]);
}
