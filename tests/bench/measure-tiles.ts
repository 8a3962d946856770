import { GeoJSONVT } from "@maplibre/geojson-vt";
import { fromGeojsonVt } from "@maplibre/vt-pbf";
import type { Feature, Polygon } from "geojson";
import { buildLog } from "@/lib/build/build-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { drawValueTile } from "@/lib/server/tiles/draw-tile";
import { createBenchmarkLog } from "@/lib/simulator/benchmark-log";
import { pairedRatio, printRatio } from "@/tests/bench/ratios";
import { buildTileIndex, tileIndexBounds } from "@/lib/tiles/build-tile-index";
import { rasteriseTile } from "@/lib/tiles/rasterise-tile";
import { fromWorld, tileAt } from "@/lib/tiles/tile-address";
import { writeCellCorners, type TileIndex } from "@/lib/tiles/tile-index";
import { valueScale } from "@/lib/tiles/value-scale";

const ZOOM = 15;
/** No simplification: it would drop cells this small, and the two tiles would not hold the same. */
const VECTOR = { maxZoom: 18, indexMaxZoom: 5, extent: 4096, tolerance: 0 };

function placeLog(): PlacedLog {
  const built = buildLog(createBenchmarkLog("small"), null);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

/** Every drawn cell as a polygon with its value: what a vector tile would carry. */
function cellFeatures(index: TileIndex, values: Float32Array): Feature<Polygon>[] {
  const features: Feature<Polygon>[] = [];
  const corners = new Float64Array(8);
  for (let record = 0; record < index.records; record++) {
    if (index.previousFrame[record]! < 0) continue;
    for (let row = 0; row < index.rows; row++) {
      const value = values[record * index.rows + row]!;
      if (Number.isNaN(value)) continue;
      writeCellCorners(index, record, row, corners);
      const ring = [0, 2, 4, 6, 0].map((at) => fromWorld(corners[at]!, corners[at + 1]!));
      const geometry = { type: "Polygon" as const, coordinates: [ring] };
      features.push({ type: "Feature", geometry, properties: { value } });
    }
  }
  return features;
}

async function timed<T>(work: () => T | Promise<T>): Promise<{ ms: number; value: T }> {
  const started = performance.now();
  const value = await work();
  return { ms: performance.now() - started, value };
}

/** A z15 value tile against a z15 vector tile of the very same cells, both from an index that stands already. */
export async function measureTiles(rounds: number): Promise<void> {
  const placed = placeLog();
  const channel = placed.log.channels[0]!;
  const indexing = await timed(() => buildTileIndex(placed));
  const index = indexing.value;
  const bounds = tileIndexBounds(index)!;
  const address = tileAt((bounds[0] + bounds[2]) / 2, (bounds[1] + bounds[3]) / 2, ZOOM);
  const scale = valueScale(channel);
  const features = cellFeatures(index, channel.values);
  const collection = { type: "FeatureCollection" as const, features };
  const vectorIndexing = await timed(() => new GeoJSONVT(collection, VECTOR));
  const drawValue = async () => {
    const pixels = rasteriseTile(index, channel, { ...address, size: 512 });
    return drawValueTile(pixels, scale);
  };
  const pairs: { ours: number; base: number }[] = [];
  let sizes = { ours: 0, base: 1 };
  for (let round = 0; round <= rounds; round++) {
    const ours = await timed(drawValue);
    // A tile is kept by the index once it is made: each round needs an index of its own.
    const fresh = new GeoJSONVT(collection, VECTOR);
    const base = await timed(() => {
      const tile = fresh.getTile(address.z, address.x, address.y);
      if (!tile) throw new Error("the vector index has no such tile");
      return fromGeojsonVt({ cells: tile });
    });
    sizes = { ours: ours.value.byteLength, base: base.value.byteLength };
    if (round > 0) pairs.push({ ours: ours.ms, base: base.ms });
  }
  const cells = `${features.length} cells, small log: the vector index does not hold the large one`;
  printRatio(`z${ZOOM} value tile / z${ZOOM} vector tile, time`, pairedRatio(pairs), cells);
  printRatio(`z${ZOOM} value tile / z${ZOOM} vector tile, bytes`, (sizes.ours / sizes.base).toFixed(2));
  printRatio(`  index to draw from / vector index, time`, (indexing.ms / vectorIndexing.ms).toFixed(2), "one run");
}
