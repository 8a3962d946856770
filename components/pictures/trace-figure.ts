import type { Map as MapLibreMap } from "maplibre-gl";
import type { Figure } from "@/components/pictures/figure";
import { traceElement } from "@/components/pictures/trace-element";
import type { PictureBody } from "@/lib/pictures/compose-picture";
import { drawNorth } from "@/lib/pictures/draw-north";

/** A figure as it is on the screen at this moment; null where it is not drawn. */
export function traceFigure({ element, map }: Figure): PictureBody | null {
  const root = element();
  if (!root) return null;
  // A map's canvas holds its picture only until the browser has shown it: painted again and read in one go.
  map?.redraw();
  const body = traceElement(root);
  if (body.widthPx === 0 || body.heightPx === 0) return null;
  return map ? { ...body, svg: body.svg + drawNorth() } : body;
}

/** Dots of a picture for each of the page's: what paper needs to look sharp. */
const LEAST_RATIO = 2;
/** A map whose tiles do not come is pictured as it is. */
const LONGEST_WAIT_MS = 15_000;

/** The same with a map painted finely enough for paper, whatever the screen. */
export async function traceFineFigure(figure: Figure): Promise<PictureBody | null> {
  const { map } = figure;
  if (!map || map.getPixelRatio() >= LEAST_RATIO) return traceFigure(figure);
  const usual = map.getPixelRatio();
  map.setPixelRatio(LEAST_RATIO);
  try {
    await untilPainted(map);
    return traceFigure(figure);
  } finally {
    map.setPixelRatio(usual);
  }
}

function untilPainted(map: MapLibreMap): Promise<void> {
  return new Promise((resolve) => {
    const timer = setTimeout(resolve, LONGEST_WAIT_MS);
    map.once("idle", () => {
      clearTimeout(timer);
      resolve();
    });
    map.triggerRepaint();
  });
}
