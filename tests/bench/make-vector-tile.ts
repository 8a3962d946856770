import type { GeoJSONVTFeature } from "@maplibre/geojson-vt";
import { fromVectorTileJs, GeoJSONWrapper } from "@maplibre/vt-pbf";
import type { DrawnChannel } from "@/lib/tiles/rasterise-tile";
import { writeCellCorners, type TileIndex } from "@/lib/tiles/tile-index";
import type { TileAddress } from "@/lib/tiles/tile-address";

const LAYER = "cells";
const EXTENT = 4096;
/** Tile units that cells may lie outside the tile. */
const BUFFER = 64;
/** Pixels along a side of a tile on the screen. */
const TILE_PX = 512;

type Place = [x: number, y: number];

/** First and last record and row of cells put together. */
interface Block {
  first: number;
  last: number;
  row: number;
  lastRow: number;
}

export interface VectorSource {
  index: TileIndex;
  channel: DrawnChannel;
  /** Cells smaller than so many pixels of the screen are put together, rows beside rows and records after records. */
  leastPx: number;
}

/** The cells of a tile as polygons with a value. */
export function makeVectorTile(
  { index, channel, leastPx }: VectorSource,
  address: TileAddress,
): { features: number; bytes: Uint8Array } {
  const leastM = leastPx / (index.worldPerM * 2 ** address.z * TILE_PX);
  const rowStep = Math.max(1, Math.round(leastM / index.narrowestRowM));
  const recordStep = Math.max(1, Math.round(leastM / index.medianCellLengthM));
  const features: GeoJSONVTFeature[] = [];
  for (let first = 0, last = 0; first < index.records; first = last + 1) {
    last = first;
    if (index.previousFrame[first]! < 0) continue;
    while (last + 1 < first + recordStep && last + 1 < index.records && index.previousFrame[last + 1] === last)
      last += 1;
    for (let row = 0; row < index.rows; row += rowStep) {
      const block = { first, last, row, lastRow: Math.min(index.rows, row + rowStep) - 1 };
      const value = channel.values[first * channel.rows + row]!;
      const ring = Number.isNaN(value) ? null : ringOf(index, block, address);
      if (ring) features.push({ type: 3, geometry: [ring], tags: { value } });
    }
  }
  const cells = new GeoJSONWrapper(features, { version: 2, extent: EXTENT });
  cells.name = LAYER;
  return { features: features.length, bytes: fromVectorTileJs({ layers: { [LAYER]: cells } }) };
}

const corners = new Float64Array(8);

/** The outline of cells put together, in tile units; null beside the tile. */
function ringOf(index: TileIndex, { first, last, row, lastRow }: Block, { z, x, y }: TileAddress): Place[] | null {
  const scale = 2 ** z * EXTENT;
  const place = (at: number): Place => [
    Math.round(corners[at]! * scale) - x * EXTENT,
    Math.round(corners[at + 1]! * scale) - y * EXTENT,
  ];
  writeCellCorners(index, first, row, corners);
  const startLeft = place(0);
  if (startLeft.some((unit) => unit < -BUFFER || unit > EXTENT + BUFFER)) return null;
  writeCellCorners(index, first, lastRow, corners);
  const startRight = place(2);
  writeCellCorners(index, last, lastRow, corners);
  const endRight = place(4);
  writeCellCorners(index, last, row, corners);
  return [startLeft, startRight, endRight, place(6), startLeft];
}
