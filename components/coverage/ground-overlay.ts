import type { FeatureCollection } from "geojson";
import type { GeoJSONSource, LayerSpecification, Map as MapLibreMap } from "maplibre-gl";
import { MAP_COLOURS } from "@/components/map/base-style";
import { FIRST_LAYER_OVER_VALUES } from "@/components/map/overlay-layers";
import type { GroundLayer } from "@/lib/map-state/ground-layers";

const sourceOf = (layer: GroundLayer) => `ground-${layer}`;

/** The readings stay readable beneath: outlines, and patterns with gaps. */
const LAYERS: Record<GroundLayer, LayerSpecification[]> = {
  swaths: [
    {
      id: "ground-swaths-line",
      type: "line",
      source: sourceOf("swaths"),
      layout: { "line-join": "round" },
      paint: { "line-color": MAP_COLOURS.ink, "line-width": 1, "line-opacity": 0.75 },
    },
  ],
  overlap: [
    {
      id: "ground-overlap-fill",
      type: "fill",
      source: sourceOf("overlap"),
      paint: { "fill-pattern": "ground-overlap" },
    },
    {
      id: "ground-overlap-line",
      type: "line",
      source: sourceOf("overlap"),
      paint: { "line-color": MAP_COLOURS.ink, "line-width": 1 },
    },
  ],
  skips: [
    {
      id: "ground-skips-halo",
      type: "line",
      source: sourceOf("skips"),
      paint: { "line-color": MAP_COLOURS.sheet, "line-width": 6 },
    },
    {
      id: "ground-skips-line",
      type: "line",
      source: sourceOf("skips"),
      paint: { "line-color": MAP_COLOURS.clay, "line-width": 3 },
    },
  ],
};

/** Shows areas over the readings and under the boundary, or with null takes them away. */
export function setGroundOverlay(map: MapLibreMap, layer: GroundLayer, areas: FeatureCollection | null): void {
  const source = sourceOf(layer);
  if (areas === null) {
    for (const { id } of LAYERS[layer]) if (map.getLayer(id)) map.removeLayer(id);
    if (map.getSource(source)) map.removeSource(source);
    return;
  }
  const there = map.getSource<GeoJSONSource>(source);
  if (there) {
    there.setData(areas);
    return;
  }
  if (!map.hasImage("ground-overlap")) map.addImage("ground-overlap", drawHatch(), { pixelRatio: 2 });
  map.addSource(source, { type: "geojson", data: areas });
  for (const spec of LAYERS[layer]) map.addLayer(spec, FIRST_LAYER_OVER_VALUES);
}

const TILE_PX = 14;

/** Lines from top left to bottom right: against the hatch of ground that was not logged. */
function drawHatch(): ImageData {
  const image = new ImageData(TILE_PX, TILE_PX);
  for (let y = 0; y < TILE_PX; y += 1) {
    for (let x = 0; x < TILE_PX; x += 1) {
      const at = (y * TILE_PX + x) * 4;
      const place = (x - y + TILE_PX) % TILE_PX;
      if (place < 3) image.data.set([0x1e, 0x24, 0x30, 255], at);
      else if (place < 5) image.data.set([255, 255, 255, 200], at);
    }
  }
  return image;
}
