"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useState } from "react";
import { useMapGround } from "@/components/field-book/use-map-ground";
import type { Classes } from "@/components/field-book/use-classes";
import { useTileJson } from "@/components/field-book/use-log-data";
import { openingBounds } from "@/components/field-book/opening-bounds";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { FIRST_LAYER_OVER_VALUES } from "@/components/map/overlay-layers";
import { TitledMap } from "@/components/map/titled-map";
import { colourExpression, showValues } from "@/components/map/value-layer";
import { channelWords } from "@/lib/legend/channel-words";
import type { Field } from "@/lib/schemas/fields";
import type { Log } from "@/lib/schemas/logs";

export interface ComparedMapProps {
  title: string;
  field: Field;
  log: Log;
  channel: string;
  classes: Classes | null;
  basemap: BasemapConfig;
  onMap: (map: MapLibreMap | null) => void;
}

/** One log of a comparison on its ground, in the classes of both. */
export function ComparedMap({ title, field, log, channel, classes, basemap, onMap }: ComparedMapProps) {
  const [map, setMap] = useState<MapLibreMap | null>(null);
  const [bounds] = useState(() => openingBounds(field, log));
  const tiles = useTileJson({ logId: log.id, version: log.version, revision: log.revision }, channel);
  const tileJson = tiles.data;
  useMapGround(map, { bounds, boundary: field.boundary });
  useEffect(() => {
    if (!map || !tileJson || !classes || classes.context.channel !== tileJson.encoding.channel) return;
    const colour = colourExpression(classes.edges, classes.colours, tileJson.encoding);
    showValues(map, { tileJson, colour, beforeLayer: FIRST_LAYER_OVER_VALUES });
  }, [map, tileJson, classes]);
  return (
    <TitledMap
      title={
        <>
          {title}: {log.name}
          <span className="font-normal text-ink-soft"> · {field.name}</span>
        </>
      }
      isTrouble={tiles.isError}
      basemap={basemap}
      bounds={bounds}
      label={`Map, ${title.toLowerCase()}`}
      description={`${channelWords(channel).name}, ${title.toLowerCase()}, north up. The tables above give the difference in numbers.`}
      onMap={(ready) => {
        setMap(ready);
        onMap(ready);
      }}
    />
  );
}
