type MapLibre = typeof import("maplibre-gl");

let loading: Promise<MapLibre> | null = null;

/** The map library, loaded once and only where a map is shown. Its worker is a file of our own site (strict security policy). */
export function loadMapLibre(): Promise<MapLibre> {
  loading ??= import("maplibre-gl").then((maplibre) => {
    maplibre.setWorkerUrl("/maplibre-gl-worker.mjs");
    // The workers start while the page still asks what to show.
    maplibre.prewarm();
    return maplibre;
  });
  return loading;
}
