import "server-only";
import type { BasemapConfig } from "@/components/map/basemap-config";

/** The installation's own ground picture, if it names one. */
export function readBasemap(): BasemapConfig {
  return {
    styleUrl: process.env.BASEMAP_STYLE_URL || null,
    tilesUrl: process.env.BASEMAP_TILES_URL || null,
    attribution: process.env.BASEMAP_ATTRIBUTION || null,
  };
}
