import type { FeatureCollection } from "geojson";
import type { GeoJSONSource, LayerSpecification, Map as MapLibreMap } from "maplibre-gl";
import { MAP_COLOURS } from "@/components/map/base-style";
import { FIRST_LAYER_OVER_VALUES } from "@/components/map/overlay-layers";
import type { LimitZoneKind } from "@/lib/schemas/limit-zones";
import type { GroundLayer } from "@/lib/map-state/ground-layers";

const sourceOf = (layer: GroundLayer) => `ground-${layer}`;

/** Zones of a kind: a hatch of their own, with an outline that is seen from far off. */
function zoneLayers(kind: LimitZoneKind): LayerSpecification[] {
  const source = sourceOf(kind);
  return [
    { id: `ground-${kind}-fill`, type: "fill", source, paint: { "fill-pattern": `ground-${kind}` } },
    {
      id: `ground-${kind}-line`,
      type: "line",
      source,
      paint: { "line-color": MAP_COLOURS.ink, "line-width": ["interpolate", ["linear"], ["zoom"], 15, 0.5, 19, 1.25] },
    },
  ];
}

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
  "under-target": zoneLayers("under-target"),
  "at-limit": zoneLayers("at-limit"),
  "over-target": zoneLayers("over-target"),
  "too-shallow": zoneLayers("too-shallow"),
};

/** Which pixels of a tile are drawn: kinds differ by the way their lines run, so that they can be told in grey. */
const HATCHES: Partial<Record<GroundLayer, (x: number, y: number) => number>> = {
  overlap: (x, y) => x - y,
  "under-target": (x, y) => x + y,
  "at-limit": (_, y) => y,
  "over-target": (x) => x,
  "too-shallow": (x, y) => Math.min((x + y) % TILE_PX, (x - y + TILE_PX) % TILE_PX),
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
  const hatch = HATCHES[layer];
  if (hatch && !map.hasImage(source)) map.addImage(source, drawHatch(hatch), { pixelRatio: 2 });
  map.addSource(source, { type: "geojson", data: areas });
  for (const spec of LAYERS[layer]) map.addLayer(spec, FIRST_LAYER_OVER_VALUES);
}

const TILE_PX = 14;

/** Dark lines with a light edge where `lineOf` is near 0, going round the tile: against the hatch of ground that was not logged. */
function drawHatch(lineOf: (x: number, y: number) => number): ImageData {
  const image = new ImageData(TILE_PX, TILE_PX);
  for (let y = 0; y < TILE_PX; y += 1) {
    for (let x = 0; x < TILE_PX; x += 1) {
      const at = (y * TILE_PX + x) * 4;
      const place = (lineOf(x, y) + TILE_PX) % TILE_PX;
      if (place < 3) image.data.set([0x1e, 0x24, 0x30, 255], at);
      else if (place < 5) image.data.set([255, 255, 255, 200], at);
    }
  }
  return image;
}
