import { readFileSync } from "node:fs";
import { createServer, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import type { TileAddress } from "@/lib/tiles/tile-address";

const MAPLIBRE = "node_modules/maplibre-gl/dist";

/** What the field book shows, for a map of nothing but the library. */
export interface VectorLook {
  longitude: number;
  latitude: number;
  zoom: number;
  width: number;
  height: number;
  /** Class edges, and one colour more. */
  edges: readonly number[];
  colours: readonly string[];
}

export interface VectorPage {
  url: string;
  close: () => Promise<void>;
}

/** A page with a map library, one vector source and one fill layer; it marks the moment it is painted as ours does. */
function pageOf(look: VectorLook, mark: string): string {
  const steps = look.edges.flatMap((edge, at) => [edge, look.colours[at + 1]]);
  const colour = ["step", ["get", "value"], look.colours[0], ...steps];
  return `<!doctype html><meta charset="utf-8"><link rel="stylesheet" href="/maplibre-gl.css">
<style>body { margin: 0 } #map { width: ${look.width}px; height: ${look.height}px }</style><div id="map"></div>
<script type="module">
import * as maplibre from "/maplibre-gl.mjs";
maplibre.setWorkerUrl("/maplibre-gl-worker.mjs");
const tiles = [location.origin + "/tiles/{z}/{x}/{y}.mvt"];
const map = new maplibre.Map({
  container: "map", center: [${look.longitude}, ${look.latitude}], zoom: ${look.zoom}, fadeDuration: 0, attributionControl: false,
  style: {
    version: 8,
    sources: { cells: { type: "vector", tiles, minzoom: 8, maxzoom: 22 } },
    layers: [{ id: "cells", type: "fill", source: "cells", "source-layer": "cells",
      paint: { "fill-antialias": false, "fill-color": ${JSON.stringify(colour)} } }],
  },
});
const look = ({ sourceId, tile }) => {
  if (sourceId !== "cells" || !tile || !map.isSourceLoaded("cells")) return;
  map.off("sourcedata", look);
  map.once("render", () => performance.mark("${mark}"));
  map.triggerRepaint();
};
map.on("sourcedata", look);
</script>`;
}

const TYPES: Record<string, string> = { mjs: "text/javascript", css: "text/css", map: "application/json" };

function sendLibrary(path: string, response: ServerResponse): void {
  response.setHeader("content-type", TYPES[path.split(".").at(-1) ?? ""] ?? "application/octet-stream");
  response.end(readFileSync(`${MAPLIBRE}${path}`));
}

/** Serves such a page on this machine. Tiles are made once and kept, so that only the browser is measured. */
export async function serveVectorPage(options: {
  look: VectorLook;
  mark: string;
  drawTile: (address: TileAddress) => Uint8Array;
}): Promise<VectorPage> {
  const made = new Map<string, Uint8Array>();
  const server = createServer((request, response) => {
    const path = request.url ?? "/";
    const [, z, x, y] = (/^\/tiles\/(\d+)\/(\d+)\/(\d+)\.mvt$/.exec(path) ?? []).map(Number);
    if (z !== undefined && x !== undefined && y !== undefined) {
      const tile = made.get(path) ?? options.drawTile({ z, x, y });
      made.set(path, tile);
      response.setHeader("content-type", "application/vnd.mapbox-vector-tile");
      response.end(tile);
    } else if (/^\/maplibre-gl[a-z-]*\.(mjs|css)$/.test(path)) sendLibrary(path, response);
    else if (path === "/") {
      response.setHeader("content-type", "text/html");
      response.end(pageOf(options.look, options.mark));
    } else response.writeHead(404).end();
  });
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  const { port } = server.address() as AddressInfo;
  return {
    url: `http://127.0.0.1:${port}/`,
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
}
