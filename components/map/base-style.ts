import type { LayerSpecification, StyleSpecification } from "maplibre-gl";
import type { BasemapConfig } from "@/components/map/basemap-config";

export const MAP_COLOURS = {
  sheet: "#FFFFFF",
  rule: "#E4E0D5",
  line: "#C9C3B2",
  ink: "#1E2430",
  inkFaint: "#6B7280",
  straw: "#C29A45",
  clay: "#9A4A2C",
  slate: "#2F5D80",
} as const;

const FONT_FACES: StyleSpecification["font-faces"] = { "Roboto Flex": [{ url: "/basemap/roboto-flex.woff2" }] };

/** The style to open the map with: the installation's own, with our font for the grid's numbers, or the offline default. */
export async function chooseStyle(basemap: BasemapConfig): Promise<StyleSpecification> {
  if (!basemap.styleUrl) return baseStyle(basemap);
  const answer = await fetch(basemap.styleUrl);
  if (!answer.ok) return baseStyle(basemap);
  const style = (await answer.json()) as StyleSpecification;
  return { ...style, "font-faces": { ...style["font-faces"], ...FONT_FACES } };
}

/**
 * White ground, and whatever tiles the installation names. Land and borders come in later, and only once somebody zooms out
 * so far that they mean something (see map-grid).
 */
export function baseStyle({ tilesUrl, attribution }: BasemapConfig): StyleSpecification {
  const layers: LayerSpecification[] = [
    { id: "ground", type: "background", paint: { "background-color": MAP_COLOURS.sheet } },
  ];
  if (tilesUrl) layers.push({ id: "picture", type: "raster", source: "picture" });
  return {
    version: 8,
    "font-faces": FONT_FACES,
    sources: tilesUrl
      ? { picture: { type: "raster", tiles: [tilesUrl], tileSize: 256, attribution: attribution ?? "" } }
      : {},
    layers,
  };
}

/** The atlas lines are too coarse for a field: they end here. */
export const ATLAS_BELOW_ZOOM = 11;

const ATLAS_COLOURS = {
  counties: MAP_COLOURS.rule,
  states: MAP_COLOURS.line,
  borders: MAP_COLOURS.line,
  land: MAP_COLOURS.inkFaint,
} as const;

/** Sources and layers of the atlas, lowest first. */
export const ATLAS_LAYERS = (["counties", "states", "borders", "land"] as const).map((name) => ({
  id: `atlas-${name}`,
  source: { type: "geojson" as const, data: `/basemap/${name}.json`, tolerance: 0.2, maxzoom: 10 },
  layer: {
    id: `atlas-${name}`,
    type: "line" as const,
    source: `atlas-${name}`,
    maxzoom: ATLAS_BELOW_ZOOM,
    minzoom: name === "counties" ? 5 : 0,
    paint: { "line-color": ATLAS_COLOURS[name], "line-width": 1 },
  },
}));

/** Grid lines and their numbers. */
export const GRID_SOURCES = ["grid", "grid-labels"] as const;
export const GRID_LINES: LayerSpecification = {
  id: "grid",
  type: "line",
  source: "grid",
  paint: { "line-color": MAP_COLOURS.rule, "line-width": 1 },
};
export const GRID_LABELS: LayerSpecification = {
  id: "grid-labels",
  type: "symbol",
  source: "grid-labels",
  layout: {
    "text-field": ["get", "text"],
    "text-font": ["Roboto Flex"],
    "text-size": 11,
    "text-anchor": ["match", ["get", "edge"], "left", "left", "bottom"],
    "text-offset": ["match", ["get", "edge"], "left", ["literal", [0.4, 0]], ["literal", [0, -0.3]]],
    "text-allow-overlap": true,
    "text-ignore-placement": true,
  },
  paint: { "text-color": MAP_COLOURS.inkFaint, "text-halo-color": MAP_COLOURS.sheet, "text-halo-width": 1.5 },
};
