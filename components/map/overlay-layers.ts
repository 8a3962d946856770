import type { Feature, FeatureCollection, Geometry } from "geojson";
import type { GeoJSONSource, LayerSpecification, Map as MapLibreMap } from "maplibre-gl";
import { GRID_LABELS, GRID_LINES, GRID_SOURCES, MAP_COLOURS } from "@/components/map/base-style";

/** Things drawn over or under the values, each fed by its own source. */
const OVERLAYS = ["boundary", "pass", "stretch", "row", "places"] as const;
export type OverlayName = (typeof OVERLAYS)[number] | (typeof GRID_SOURCES)[number];
export type OverlayData = Geometry | FeatureCollection | null;

/** Shows nothing: the values go under it, and everything after it lies on top of them. */
export const FIRST_LAYER_OVER_VALUES = "over-values";
/** What covers values, but no line drawn over them, goes under this one. */
export const FIRST_LINE_OVER_VALUES = "boundary-line";

const BELOW: LayerSpecification[] = [
  { id: "boundary-fill", type: "fill", source: "boundary", paint: { "fill-pattern": "hatch" } },
  GRID_LINES,
];

function outline(source: OverlayName, name: string, look: { colour: string; width: number }): LayerSpecification {
  return {
    id: name,
    type: "line",
    source,
    layout: { "line-join": "round" },
    paint: { "line-color": look.colour, "line-width": look.width },
  };
}

const ABOVE: LayerSpecification[] = [
  { id: FIRST_LAYER_OVER_VALUES, type: "background", layout: { visibility: "none" } },
  outline("boundary", FIRST_LINE_OVER_VALUES, { colour: MAP_COLOURS.ink, width: 1.5 }),
  outline("pass", "pass-halo", { colour: MAP_COLOURS.sheet, width: 4 }),
  outline("pass", "pass-line", { colour: MAP_COLOURS.slate, width: 2 }),
  {
    id: "stretch-fill",
    type: "fill",
    source: "stretch",
    paint: { "fill-color": MAP_COLOURS.slate, "fill-opacity": 0.2 },
  },
  outline("stretch", "stretch-line", { colour: MAP_COLOURS.slate, width: 3 }),
  outline("row", "row-halo", { colour: MAP_COLOURS.sheet, width: 4 }),
  outline("row", "row-line", { colour: MAP_COLOURS.slate, width: 2 }),
  {
    id: "place-fill",
    type: "fill",
    source: "places",
    filter: ["==", ["geometry-type"], "Polygon"],
    paint: { "fill-color": MAP_COLOURS.clay, "fill-opacity": 0.18 },
  },
  outline("places", "place-halo", { colour: MAP_COLOURS.sheet, width: 5 }),
  outline("places", "place-line", { colour: MAP_COLOURS.clay, width: 2.5 }),
  {
    id: "place-point",
    type: "circle",
    source: "places",
    filter: ["==", ["geometry-type"], "Point"],
    paint: {
      "circle-radius": 7,
      "circle-color": "rgba(255, 255, 255, 0)",
      "circle-stroke-color": MAP_COLOURS.clay,
      "circle-stroke-width": 2.5,
    },
  },
  GRID_LABELS,
];

const NOTHING: FeatureCollection = { type: "FeatureCollection", features: [] };

/** Adds the empty sources and their layers; values later go between the two groups. */
export function addOverlays(map: MapLibreMap): void {
  map.addImage("hatch", drawHatch(), { pixelRatio: 2 });
  for (const name of [...GRID_SOURCES, ...OVERLAYS]) map.addSource(name, { type: "geojson", data: NOTHING });
  for (const layer of [...BELOW, ...ABOVE]) map.addLayer(layer);
}

/** Fills one source. */
export function setOverlay(map: MapLibreMap, name: OverlayName, data: OverlayData): void {
  map.getSource<GeoJSONSource>(name)?.setData(toCollection(data));
}

function toCollection(data: OverlayData): FeatureCollection {
  if (data === null) return NOTHING;
  if (data.type === "FeatureCollection") return data;
  const feature: Feature = { type: "Feature", properties: {}, geometry: data };
  return { type: "FeatureCollection", features: [feature] };
}

const HATCH_TILE_PX = 16;

/** One tile of 45 degree lines in rule colour, drawn at twice the size it is shown. */
function drawHatch(): ImageData {
  const image = new ImageData(HATCH_TILE_PX, HATCH_TILE_PX);
  for (let y = 0; y < HATCH_TILE_PX; y += 1) {
    for (let x = 0; x < HATCH_TILE_PX; x += 1) {
      if ((x + y) % HATCH_TILE_PX < 2) image.data.set([0xe4, 0xe0, 0xd5, 255], (y * HATCH_TILE_PX + x) * 4);
    }
  }
  return image;
}
