import type { Map as MapLibreMap } from "maplibre-gl";
import type { LegendEntry } from "@/lib/pictures/compose-picture";
import type { PictureWords } from "@/lib/pictures/picture-words";

/** A chart or map that pictures are made of. */
export interface Figure {
  /** Tells it from the others of a page. */
  id: string;
  /** Its place in print, from 1. */
  order: number;
  words: PictureWords;
  /** What its colours mean; empty where the chart says so itself. */
  legend: readonly LegendEntry[];
  /** The element that shows it, null while there is none. */
  element: () => HTMLElement | null;
  /** The map in it, where it is one. */
  map?: MapLibreMap | null;
}
