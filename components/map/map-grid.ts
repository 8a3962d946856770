import type { Map as MapLibreMap } from "maplibre-gl";
import { ATLAS_BELOW_ZOOM, ATLAS_LAYERS } from "@/components/map/base-style";
import { setOverlay } from "@/components/map/overlay-layers";
import { buildGrid } from "@/lib/map-state/build-grid";

export interface GridUnits {
  unitM: number;
  unitSign: string;
}

/** Redraws the grid for what is in view. */
export function drawGrid(map: MapLibreMap, anchor: [number, number], units: GridUnits): void {
  const bounds = map.getBounds();
  const grid = buildGrid({
    bounds: [bounds.getWest(), bounds.getSouth(), bounds.getEast(), bounds.getNorth()],
    widthPx: map.getContainer().clientWidth || 1,
    anchor,
    ...units,
  });
  setOverlay(map, "grid", grid.lines);
  setOverlay(map, "grid-labels", grid.labels);
}

/** Brings in land and borders the first time the view is wide enough for them. */
export function addAtlasWhenWide(map: MapLibreMap): void {
  // A basemap of the installation's own shows these better.
  const isOffline = map.getLayer("ground") !== undefined && map.getLayer("picture") === undefined;
  if (!isOffline || map.getZoom() >= ATLAS_BELOW_ZOOM || map.getSource("atlas-land")) return;
  for (const { id, source, layer } of ATLAS_LAYERS) {
    map.addSource(id, source);
    map.addLayer(layer, "boundary-fill");
  }
}
