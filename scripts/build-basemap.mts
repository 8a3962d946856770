/**
 * Writes what the map needs without any network to public/: land, borders, states and counties as GeoJSON (from the atlas
 * packages, Natural Earth and US Census Bureau, both public domain), the label font, and the map library's worker.
 */
import { copyFileSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import type { Geometry, MultiLineString } from "geojson";
import { feature, mesh } from "topojson-client";
import type { GeometryCollection, Topology } from "topojson-specification";

const require = createRequire(import.meta.url);
const PUBLIC = join(dirname(fileURLToPath(import.meta.url)), "..", "public");
const BASEMAP = join(PUBLIC, "basemap");

type Atlas = Topology<Record<string, GeometryCollection>>;

function readAtlas(path: string): Atlas {
  return JSON.parse(readFileSync(require.resolve(path), "utf8")) as Atlas;
}

function layerOf(atlas: Atlas, name: string): GeometryCollection {
  const layer = atlas.objects[name];
  if (!layer) throw new Error(`build-basemap: the atlas has no layer "${name}"`);
  return layer;
}

/** Lines between two members of a layer: each drawn once, coasts left out. */
function innerLines(atlas: Atlas, name: string): MultiLineString {
  return mesh(atlas, layerOf(atlas, name), (a, b) => a !== b);
}

/** Rounds to 3 decimals (about 100 m, finer than the atlas itself) and drops positions that then repeat. */
function roundPositions(value: unknown): unknown {
  if (!Array.isArray(value)) return value;
  if (typeof value[0] === "number") return value.map((number: number) => Math.round(number * 1000) / 1000);
  const rounded = value.map(roundPositions);
  return rounded.filter(
    (item, i) => i === 0 || String(item) !== String(rounded[i - 1]) || Array.isArray((item as unknown[])[0]),
  );
}

function write(name: string, geometry: Geometry): void {
  if (geometry.type === "GeometryCollection") throw new Error(`build-basemap: ${name} must be one geometry`);
  const data = {
    type: "Feature",
    properties: {},
    geometry: { ...geometry, coordinates: roundPositions(geometry.coordinates) },
  };
  writeFileSync(join(BASEMAP, `${name}.json`), JSON.stringify(data));
}

function writeLand(): void {
  const atlas = readAtlas("world-atlas/land-50m.json");
  const land = feature(atlas, layerOf(atlas, "land"));
  const polygons = land.features.flatMap(({ geometry }) => {
    if (geometry.type === "MultiPolygon") return geometry.coordinates;
    return geometry.type === "Polygon" ? [geometry.coordinates] : [];
  });
  write("land", { type: "MultiPolygon", coordinates: polygons });
}

mkdirSync(BASEMAP, { recursive: true });
writeLand();
write("borders", innerLines(readAtlas("world-atlas/countries-50m.json"), "countries"));
write("states", innerLines(readAtlas("us-atlas/states-10m.json"), "states"));
write("counties", innerLines(readAtlas("us-atlas/counties-10m.json"), "counties"));
copyFileSync(
  require.resolve("@fontsource/roboto-flex/files/roboto-flex-latin-400-normal.woff2"),
  join(BASEMAP, "roboto-flex.woff2"),
);
copyFileSync(require.resolve("maplibre-gl/dist/maplibre-gl-worker.mjs"), join(PUBLIC, "maplibre-gl-worker.mjs"));
