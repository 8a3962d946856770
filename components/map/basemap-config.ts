/** Where the ground picture comes from; both null for the offline default. Passed from the server, so one build fits all. */
export interface BasemapConfig {
  /** A MapLibre style. */
  styleUrl: string | null;
  /** Raster tiles, with {z}, {x} and {y}. */
  tilesUrl: string | null;
  /** Who made the tiles, as their licence wants it shown. */
  attribution: string | null;
}

export const OFFLINE_BASEMAP: BasemapConfig = { styleUrl: null, tilesUrl: null, attribution: null };
