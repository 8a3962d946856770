import type { Map as MapLibreMap } from "maplibre-gl";
import { loadMapLibre } from "@/components/map/load-maplibre";
import { FIRST_LAYER_OVER_VALUES } from "@/components/map/overlay-layers";
import { paintReasons, readReasons, type ReasonEncoding } from "@/lib/map-state/reason-patterns";
import type { TileJson } from "@/lib/schemas/logs";

const PROTOCOL = "reasons";
const SOURCE = "reasons";

/** `reasons://offset,redFactor,greenFactor/https://…`: how to read a tile travels in its address. */
function reasonAddress(address: string, { offset, redFactor, greenFactor }: ReasonEncoding): string {
  const absolute = address.replace(/^(?:https?:\/\/[^/]+)?(?=\/)/, window.location.origin);
  return `${PROTOCOL}://${offset},${redFactor},${greenFactor}/${absolute}`;
}

function readReasonAddress(text: string): { address: string; encoding: ReasonEncoding } {
  const [scale = "", ...rest] = text.slice(`${PROTOCOL}://`.length).split("/");
  const [offset = 0, redFactor = 256, greenFactor = 1] = scale.split(",").map(Number);
  return { address: rest.join("/"), encoding: { offset, redFactor, greenFactor } };
}

/** A value tile of the channel `flags`, painted in the patterns of its rules. */
async function paintTile(text: string, signal: AbortSignal): Promise<ImageBitmap> {
  const { address, encoding } = readReasonAddress(text);
  const reply = await fetch(address, { signal, credentials: "same-origin" });
  if (!reply.ok) throw new Error(`A tile of left-out readings was refused with status ${reply.status}.`);
  const body = await reply.blob();
  if (body.size === 0) return createImageBitmap(new ImageData(1, 1));
  // The bytes are numbers: nothing may adjust them as if they were colours.
  const picture = await createImageBitmap(body, { colorSpaceConversion: "none", premultiplyAlpha: "none" });
  const canvas = new OffscreenCanvas(picture.width, picture.height);
  const pen = canvas.getContext("2d", { willReadFrequently: true });
  if (!pen) throw new Error("This browser gives no place to draw on.");
  pen.drawImage(picture, 0, 0);
  const pixels = pen.getImageData(0, 0, picture.width, picture.height);
  const { data, width, height } = paintReasons(readReasons(pixels.data, encoding), picture.width);
  return createImageBitmap(new ImageData(data, width, height));
}

let isRegistered = false;

/** To be waited for before tiles of reasons are shown. */
export async function registerReasonTiles(): Promise<void> {
  if (isRegistered) return;
  const { addProtocol } = await loadMapLibre();
  addProtocol(PROTOCOL, async ({ url }, controller) => ({ data: await paintTile(url, controller.signal) }));
  isRegistered = true;
}

/** Shows where readings were left out, each in the pattern of its rule, over the values. */
export function showReasons(map: MapLibreMap, tileJson: TileJson): void {
  hideReasons(map);
  map.addSource(SOURCE, {
    type: "raster",
    tiles: tileJson.tiles.map((address) => reasonAddress(address, tileJson.encoding)),
    tileSize: 512,
    minzoom: tileJson.minzoom,
    maxzoom: tileJson.maxzoom,
  });
  const beforeLayer = map.getLayer(FIRST_LAYER_OVER_VALUES) ? FIRST_LAYER_OVER_VALUES : undefined;
  map.addLayer(
    {
      id: SOURCE,
      type: "raster",
      source: SOURCE,
      paint: { "raster-resampling": "nearest", "raster-fade-duration": 0 },
    },
    beforeLayer,
  );
}

export function hideReasons(map: MapLibreMap): void {
  if (map.getLayer(SOURCE)) map.removeLayer(SOURCE);
  if (map.getSource(SOURCE)) map.removeSource(SOURCE);
}
