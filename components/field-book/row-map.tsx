"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useState } from "react";
import { useGroundOverlays } from "@/components/coverage/use-ground-overlays";
import { CellMark } from "@/components/field-book/cell-mark";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { MapWords } from "@/components/field-book/map-words";
import type { Classes } from "@/components/field-book/use-classes";
import { TapSheet } from "@/components/field-book/tap-sheet";
import { useMapGround } from "@/components/field-book/use-map-ground";
import { useMapMarks } from "@/components/field-book/use-map-marks";
import { useMapPointer } from "@/components/field-book/use-map-pointer";
import { useMapValues } from "@/components/field-book/use-map-values";
import { useOverview } from "@/components/field-book/use-log-data";
import { useMapTime } from "@/components/field-book/scrubber/use-map-time";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { MapNotes } from "@/components/notes/map-notes";
import { MapPicture } from "@/components/pictures/book-figures";
import { MapCanvas } from "@/components/map/map-canvas";
import { channelWords } from "@/lib/legend/channel-words";
import type { Bounds } from "@/lib/map-state/field-book-store";
import type { PassTrack } from "@/lib/map-state/pass-track";
import type { Boundary } from "@/lib/schemas/geometry";

export interface RowMapProps {
  basemap: BasemapConfig;
  bounds: Bounds;
  boundary: Boundary | null;
  classes: Classes | null;
  track: PassTrack | undefined;
  /** On a page that scrolls. */
  gentle: boolean;
  /** What it is called where there are several. */
  label?: string;
  /** Called with the map once it can be drawn on, and with null when it is gone. */
  onMap?: (map: MapLibreMap | null) => void;
  /** Whether a tapped reading is named in a sheet; on a page that scrolls by default. */
  hasTapSheet?: boolean;
}

/** The field from above: every row's readings in class colours, linked with the unrolled pass. */
export function RowMap(props: RowMapProps) {
  const { basemap, bounds, boundary, classes, track, gentle, label, onMap, hasTapSheet = gentle } = props;
  const { store, log } = useBook();
  const [map, setMap] = useState<MapLibreMap | null>(null);
  const channel = useBookState((state) => state.channel);
  const { data: overview } = useOverview(useLogVersion(), channel);
  useMapGround(map, { bounds, boundary });
  useMapValues(map, classes);
  useMapTime(map);
  useGroundOverlays(map);
  useMapMarks(map, track);
  useMapPointer(map);
  return (
    <MapCanvas
      basemap={basemap}
      bounds={bounds}
      view={store.getState().view}
      description={`${channelWords(channel).name} of ${log.counts.rows} rows in ${log.counts.passes} passes, north up. The unrolled pass, the line-up and its table give the same readings in numbers.`}
      label={label}
      onMap={(ready) => {
        setMap(ready);
        onMap?.(ready);
      }}
      gentle={gentle}
      figure="map"
      tools={
        map ? (
          <>
            <MapPicture map={map} classes={classes} label={label} />
            <MapNotes map={map} boundary={boundary} />
          </>
        ) : null
      }
    >
      {map ? <CellMark map={map} /> : null}
      {map ? <MapWords map={map} classes={classes} unit={overview?.unit ?? ""} /> : null}
      {hasTapSheet ? <TapSheet /> : null}
    </MapCanvas>
  );
}
