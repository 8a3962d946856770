"use client";

import { useQuery } from "@tanstack/react-query";
import type { MultiPolygon, Polygon, Position } from "geojson";
import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useMemo, useState } from "react";
import { OFFLINE_BASEMAP } from "@/components/map/basemap-config";
import { MapCanvas } from "@/components/map/map-canvas";
import { drawGrid } from "@/components/map/map-grid";
import { FIRST_LAYER_OVER_VALUES, setOverlay } from "@/components/map/overlay-layers";
import { colourExpression, recolourValues, showValues } from "@/components/map/value-layer";
import { useUnits } from "@/components/units/use-units";
import { requestJson } from "@/lib/api/request-json";
import { channelWords } from "@/lib/legend/channel-words";
import { classOf } from "@/lib/legend/class-edges";
import { presetsFor, proposeEdges } from "@/lib/legend/propose-edges";
import { classColours, rampOf } from "@/lib/legend/ramps";
import type { Bounds } from "@/lib/map-state/field-book-store";
import { boundsOfGeometry, unwrapBounds } from "@/lib/map-state/geometry-bounds";
import { TileJson } from "@/lib/schemas/logs";
import { displayUnit } from "@/lib/units/display-unit";
import { formatNumber } from "@/lib/units/format-quantity";

export interface ShareMapProps {
  token: string;
  fieldName: string;
  /** The one reading shown, one of the shared layers. */
  channel: string;
  boundary: Polygon | MultiPolygon | null;
  /** West, south, east, north of the log. */
  bbox: Bounds;
  /** Lines that the page's first sentence speaks of. */
  places?: Position[][];
}

const NO_PLACES: Position[][] = [];

/** One reading of a shared log on a map that only shows: no choosing, no pointing. Prints as it stands. */
export function ShareMap({ token, fieldName, channel, boundary, bbox, places = NO_PLACES }: ShareMapProps) {
  const { system } = useUnits();
  const [map, setMap] = useState<MapLibreMap | null>(null);
  const path = `/api/v1/shared/${encodeURIComponent(token)}/tiles/${encodeURIComponent(channel)}/tiles.json`;
  const { data: tileJson } = useQuery({
    queryKey: ["shared", token, "tiles", channel],
    queryFn: () => requestJson(TileJson, path),
    staleTime: Infinity,
  });
  const [bounds] = useState<Bounds>(() => boundsOfGeometry(boundary) ?? unwrapBounds(bbox));
  const classes = useMemo(
    () => (tileJson ? classesOf(tileJson, displayUnit(tileJson.encoding.unit, system, channel).factor) : null),
    [tileJson, system, channel],
  );
  useEffect(() => {
    if (map) setOverlay(map, "boundary", boundary);
  }, [map, boundary]);
  useEffect(() => {
    if (map) setOverlay(map, "places", { type: "MultiLineString", coordinates: places });
  }, [map, places]);
  useEffect(() => {
    if (!map) return;
    const { factor, symbol } = displayUnit("m", system, "distance");
    const draw = () => drawGrid(map, [bounds[0], bounds[1]], { unitM: factor, unitSign: symbol });
    draw();
    map.on("moveend", draw);
    return () => {
      map.off("moveend", draw);
    };
  }, [map, system, bounds]);
  useEffect(() => {
    if (!map || !tileJson || !classes) return;
    const colour = colourExpression(classes.edges, classes.colours, tileJson.encoding);
    if (map.getLayer("values")) recolourValues(map, colour);
    else showValues(map, { tileJson, colour, beforeLayer: FIRST_LAYER_OVER_VALUES });
  }, [map, tileJson, classes]);
  const { name, meaning } = channelWords(channel);
  return (
    <figure className="sheet break-inside-avoid">
      <div className="h-80 print:h-64">
        <MapCanvas
          basemap={OFFLINE_BASEMAP}
          bounds={bounds}
          description={`${name} over ${fieldName}, north up. ${meaning} The sentences on this page say what it shows.`}
          onMap={setMap}
          readOnly
        />
      </div>
      <figcaption className="space-y-2 border-t border-rule p-3 text-table text-ink-soft">
        <p>
          <b className="font-semibold text-ink">{name}.</b> {meaning} North is up; hatched ground was not logged.
          {places.length > 0 ? " The thick line is the place to look at first." : ""}
        </p>
        {classes && tileJson ? <ClassKey classes={classes} unit={tileJson.encoding.unit} channel={channel} /> : null}
      </figcaption>
    </figure>
  );
}

interface ShareClasses {
  edges: number[];
  colours: string[];
}

/** About the target where one is known, as in the field's book; else published contact loads or round numbers. */
function classesOf(
  { encoding, targetMarginN = null, marginDeadbandN = null }: TileJson,
  shownFactor: number,
): ShareClasses {
  const { channel, minimum, maximum } = encoding;
  const histogram = { minimum, maximum, counts: [1] };
  const context = { channel, histogram, targetMarginN, marginDeadbandN, shownFactor };
  const edges = proposeEdges(presetsFor(context)[0] ?? "round", context);
  const hasTarget = channel === "margin" && targetMarginN !== null;
  // Without a target there is no middle to be pale: plain steps from light to dark read better.
  const ramp = channel === "margin" && !hasTarget ? "YlOrBr" : rampOf(channel);
  return {
    edges,
    colours: classColours(ramp, edges.length + 1, hasTarget ? classOf(targetMarginN, edges) : undefined),
  };
}

/** The classes as a row of swatches with the edges between them. */
function ClassKey({ classes, unit, channel }: { classes: ShareClasses; unit: string; channel: string }) {
  const { system } = useUnits();
  const { symbol, factor, decimals } = displayUnit(unit, system, channel);
  return (
    <div className="tabular max-w-md [print-color-adjust:exact]">
      <div className="flex">
        {classes.colours.map((colour) => (
          <span
            key={colour}
            className="h-4 flex-1 border-y border-ink/30 first:border-l last:border-r"
            style={{ background: colour }}
          />
        ))}
      </div>
      <div className="relative h-5">
        {classes.edges.map((edge, index) => (
          <span
            key={edge}
            className="absolute -translate-x-1/2 whitespace-nowrap"
            style={{ left: `${((index + 1) / classes.colours.length) * 100}%` }}
          >
            {formatNumber(edge / factor, decimals)}
            {index === classes.edges.length - 1 ? `\u202f${symbol}` : ""}
          </span>
        ))}
      </div>
    </div>
  );
}
