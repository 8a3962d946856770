import type { Map as MapLibreMap } from "maplibre-gl";
import { MAP_COLOURS } from "@/components/map/base-style";
import { FIRST_LINE_OVER_VALUES } from "@/components/map/overlay-layers";
import { colourExpression, valueSource } from "@/components/map/value-layer";
import type { TileJson } from "@/lib/schemas/logs";

/** Source and layer of the times at which ground was worked. */
const TIME_MASK = "worked-time";

/** Covers ground that was worked after a moment with the colour of the sheet. Tiles are fetched once: a later call recolours. */
export function showUntil(map: MapLibreMap, tileJson: TileJson, timeS: number): void {
  const colour = colourExpression([timeS], ["rgba(255, 255, 255, 0)", MAP_COLOURS.sheet], tileJson.encoding);
  if (map.getLayer(TIME_MASK)) {
    map.setPaintProperty(TIME_MASK, "color-relief-color", colour);
    return;
  }
  map.addSource(TIME_MASK, valueSource(tileJson));
  map.addLayer(
    {
      id: TIME_MASK,
      type: "color-relief",
      source: TIME_MASK,
      paint: { "color-relief-color": colour, resampling: "nearest" },
    },
    FIRST_LINE_OVER_VALUES,
  );
}

export function hideAfter(map: MapLibreMap): void {
  if (map.getLayer(TIME_MASK)) map.removeLayer(TIME_MASK);
  if (map.getSource(TIME_MASK)) map.removeSource(TIME_MASK);
}
