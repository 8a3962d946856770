import type { ExpressionSpecification, Map as MapLibreMap, RasterDEMSourceSpecification } from "maplibre-gl";
import { afterPaint } from "@/components/map/after-paint";
import { FIRST_LAYER_OVER_VALUES } from "@/components/map/overlay-layers";
import { colourStops } from "@/lib/legend/colour-stops";
import type { TileJson } from "@/lib/schemas/logs";

const SOURCE = "values";
const LAYER = "values";

/** Mark on the browser's timeline each time a channel stands on the map, its tiles drawn. */
export const VALUES_PAINTED = "values-painted";

/**
 * Class colours of value tiles. The source is told to decode to the bare code (red x 256 + green), so every stop is a whole
 * number the shader holds exactly; edges are turned into codes here.
 */
export function colourExpression(
  edges: readonly number[],
  colours: readonly string[],
  encoding: TileJson["encoding"],
): ExpressionSpecification {
  const stops = colourStops(edges, colours, encoding).flat();
  return ["interpolate", ["linear"], ["elevation"], ...stops] as ExpressionSpecification;
}

/** Source of value tiles that decodes to the bare code. */
export function valueSource({ tiles, minzoom, maxzoom }: TileJson): RasterDEMSourceSpecification {
  const decoding = { encoding: "custom", redFactor: 256, greenFactor: 1, blueFactor: 0, baseShift: 0 } as const;
  return { type: "raster-dem", ...decoding, tiles: tiles.map(absoluteAddress), tileSize: 512, minzoom, maxzoom };
}

export interface ShownValues {
  tileJson: TileJson;
  colour: ExpressionSpecification;
  /** The layer the values go under. */
  beforeLayer: string;
}

/** What is to be shown in place of what is, on maps where that is put off. */
const awaited = new WeakMap<MapLibreMap, ShownValues>();
const callOff = new WeakMap<MapLibreMap, () => void>();

/** Work on the values waits until the frame being made is seen; the latest takes the place of what waited before. */
function putOff(map: MapLibreMap, work: () => void): void {
  if (!callOff.has(map)) map.once("remove", () => callOff.get(map)?.());
  callOff.get(map)?.();
  callOff.set(map, afterPaint(work));
}

/** Shows a channel's tiles in class colours, in place of the ones shown before: those stay until the page has answered. */
export function showValues(map: MapLibreMap, shown: ShownValues): void {
  if (!map.getLayer(LAYER)) return addValues(map, shown);
  awaited.set(map, shown);
  putOff(map, () => {
    const latest = awaited.get(map) ?? shown;
    hideValues(map);
    addValues(map, latest);
  });
}

function addValues(map: MapLibreMap, { tileJson, colour, beforeLayer }: ShownValues): void {
  map.addSource(SOURCE, valueSource(tileJson));
  map.addLayer(
    {
      id: LAYER,
      type: "color-relief",
      source: SOURCE,
      paint: { "color-relief-color": colour, resampling: "nearest" },
    },
    // The layer named may have gone since it was asked for.
    map.getLayer(beforeLayer) ? beforeLayer : FIRST_LAYER_OVER_VALUES,
  );
  markWhenPainted(map);
}

/** Waits until every tile in view has come, then for the frame that draws them. */
function markWhenPainted(map: MapLibreMap): void {
  const look = ({ sourceId, tile }: { sourceId?: string; tile?: unknown }) => {
    if (sourceId !== SOURCE || !tile || !map.isSourceLoaded(SOURCE)) return;
    map.off("sourcedata", look);
    map.once("render", () => performance.mark(VALUES_PAINTED));
    map.triggerRepaint();
  };
  map.on("sourcedata", look);
}

export function hideValues(map: MapLibreMap): void {
  callOff.get(map)?.();
  awaited.delete(map);
  if (map.getLayer(LAYER)) map.removeLayer(LAYER);
  if (map.getSource(SOURCE)) map.removeSource(SOURCE);
}

/** New colours for the tiles already here, or for those awaited: no request. */
export function recolourValues(map: MapLibreMap, colour: ExpressionSpecification): void {
  const next = awaited.get(map);
  if (next) awaited.set(map, { ...next, colour });
  else if (map.getLayer(LAYER)) putOff(map, () => map.setPaintProperty(LAYER, "color-relief-color", colour));
}

/** The worker that fetches tiles has no page to be relative to, and a page may be open under another name of the same server. */
export function absoluteAddress(address: string): string {
  return address.replace(/^(?:https?:\/\/[^/]+)?(?=\/)/, window.location.origin);
}
