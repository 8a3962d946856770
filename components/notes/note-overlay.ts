import type { FeatureCollection } from "geojson";
import type { GeoJSONSource, LayerSpecification, Map as MapLibreMap } from "maplibre-gl";
import { MAP_COLOURS } from "@/components/map/base-style";
import type { Note } from "@/lib/schemas/notes";

const SOURCE = "field-notes";
const LAYERS: LayerSpecification[] = [
  {
    id: "note-halo",
    type: "line",
    source: SOURCE,
    filter: ["==", ["geometry-type"], "LineString"],
    layout: { "line-cap": "round", "line-join": "round" },
    paint: { "line-color": MAP_COLOURS.sheet, "line-width": 6 },
  },
  {
    id: "note-line",
    type: "line",
    source: SOURCE,
    filter: ["==", ["geometry-type"], "LineString"],
    layout: { "line-cap": "round", "line-join": "round" },
    paint: { "line-color": MAP_COLOURS.clay, "line-width": 3, "line-dasharray": [2, 1.5] },
  },
  {
    id: "note-point",
    type: "circle",
    source: SOURCE,
    filter: ["==", ["geometry-type"], "Point"],
    paint: {
      "circle-radius": 10,
      "circle-color": MAP_COLOURS.sheet,
      "circle-stroke-color": MAP_COLOURS.clay,
      "circle-stroke-width": 2,
    },
  },
  {
    id: "note-number",
    type: "symbol",
    source: SOURCE,
    layout: {
      "symbol-placement": "point",
      "text-field": ["get", "number"],
      "text-font": ["Roboto Flex"],
      "text-size": 12,
      "text-allow-overlap": true,
      "text-ignore-placement": true,
    },
    paint: { "text-color": MAP_COLOURS.ink, "text-halo-color": MAP_COLOURS.sheet, "text-halo-width": 2 },
  },
];

/** Draws notes with their numbers over everything else on a map; `hiddenId` is the one that is being drawn anew. */
export function showNotes(map: MapLibreMap, notes: readonly Note[], hiddenId: string | null): void {
  const data: FeatureCollection = {
    type: "FeatureCollection",
    features: notes.flatMap(({ id, geometry }, index) =>
      id === hiddenId ? [] : [{ type: "Feature" as const, properties: { number: String(index + 1) }, geometry }],
    ),
  };
  const source = map.getSource<GeoJSONSource>(SOURCE);
  if (source) {
    source.setData(data);
    return;
  }
  if (data.features.length === 0) return;
  map.addSource(SOURCE, { type: "geojson", data });
  for (const layer of LAYERS) map.addLayer(layer);
}
