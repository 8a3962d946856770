import sharp from "sharp";
import { parseColour } from "@/lib/legend/parse-colour";
import { writeIndexedPng } from "@/lib/server/tiles/write-indexed-png";
import { coarsenCodes } from "@/lib/tiles/coarsen-codes";
import { encodePaletteTile } from "@/lib/tiles/encode-palette-tile";
import { encodeValueTile } from "@/lib/tiles/encode-value-tile";
import type { ValueScale } from "@/lib/tiles/value-scale";

/** Pixels along a side. */
export const TILE_SIZE = 512;

/** A phone in a field fetches a dozen of them. */
const MOST_VALUE_BYTES = 250_000;

/** So many levels of pure noise take under the bytes above: log2(180) bits a pixel. */
const MOST_LEVELS = 180;

/**
 * A value tile. One that would be too heavy, as of noise far finer than a screen can show, is rounded to fewer levels: at most
 * half of a 177th of the range of values in the tile.
 */
export async function drawValueTile(pixels: Float32Array, scale: ValueScale): Promise<Uint8Array<ArrayBuffer>> {
  const bytes = encodeValueTile(pixels, scale);
  const image = sharp(bytes, { raw: { width: TILE_SIZE, height: TILE_SIZE, channels: 3 } });
  const exact = await image.png({ compressionLevel: 6, palette: false }).toBuffer();
  return exact.byteLength > MOST_VALUE_BYTES ? drawCoarseTile(bytes) : Uint8Array.from(exact);
}

function drawCoarseTile(bytes: Uint8Array): Uint8Array<ArrayBuffer> {
  const codes = Uint16Array.from({ length: bytes.length / 3 }, (_, i) => bytes[i * 3]! * 256 + bytes[i * 3 + 1]!);
  const coarse = coarsenCodes(codes, MOST_LEVELS);
  const palette = coarse.codes.map((code) => [code >> 8, code & 255, 0] as [number, number, number]);
  return writeIndexedPng({ size: TILE_SIZE, places: coarse.levels, palette, hasClearFirst: false });
}

/** A picture of classes: see-through where nothing was logged. `colours` are one more than `breaks`. */
export function drawPaletteTile(
  pixels: Float32Array,
  breaks: readonly number[],
  colours: readonly string[],
): Uint8Array<ArrayBuffer> {
  const places = encodePaletteTile(pixels, breaks);
  const palette = [[0, 0, 0] as [number, number, number], ...colours.map(parseColour)];
  return writeIndexedPng({ size: TILE_SIZE, places, palette, hasClearFirst: true });
}
