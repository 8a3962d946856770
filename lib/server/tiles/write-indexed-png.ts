import { crc32, deflateSync } from "node:zlib";
import type { Rgb } from "@/lib/legend/parse-colour";

export interface IndexedPicture {
  size: number;
  /** One byte a pixel, row by row: a place in `palette`. */
  places: Uint8Array;
  /** At most 256. */
  palette: readonly Rgb[];
  /** Whether place 0 is see-through. */
  hasClearFirst: boolean;
}

const SIGNATURE = Uint8Array.of(137, 80, 78, 71, 13, 10, 26, 10);

/**
 * A square PNG with a palette, in as few bits a pixel as its colours need. Written here and not by the picture library, which
 * chooses colours of its own: those of a tile stand for numbers and classes, and must come out as they went in.
 * Source: Portable Network Graphics, W3C Recommendation, sections 4 and 11.
 */
export function writeIndexedPng({ size, places, palette, hasClearFirst }: IndexedPicture): Uint8Array<ArrayBuffer> {
  const bits = palette.length <= 2 ? 1 : palette.length <= 4 ? 2 : palette.length <= 16 ? 4 : 8;
  const header = new Uint8Array(13);
  const view = new DataView(header.buffer);
  view.setUint32(0, size);
  view.setUint32(4, size);
  header.set([bits, 3, 0, 0, 0], 8);
  const chunks = [
    writeChunk("IHDR", header),
    writeChunk("PLTE", Uint8Array.from(palette.flat())),
    ...(hasClearFirst ? [writeChunk("tRNS", Uint8Array.of(0))] : []),
    writeChunk("IDAT", deflateSync(packLines(places, size, bits), { level: 6 })),
    writeChunk("IEND", new Uint8Array(0)),
  ];
  return Uint8Array.from(Buffer.concat([SIGNATURE, ...chunks]));
}

/** Lines of pixels, the leftmost in the highest bits, each behind a filter byte of 0. */
function packLines(places: Uint8Array, size: number, bits: number): Uint8Array {
  const perByte = 8 / bits;
  const lineBytes = 1 + Math.ceil(size / perByte);
  const lines = new Uint8Array(lineBytes * size);
  for (let y = 0; y < size; y += 1) {
    const start = y * lineBytes + 1;
    for (let x = 0; x < size; x += 1) {
      const shift = 8 - bits - (x % perByte) * bits;
      lines[start + Math.floor(x / perByte)]! |= places[y * size + x]! << shift;
    }
  }
  return lines;
}

function writeChunk(name: string, data: Uint8Array): Uint8Array {
  const named = Buffer.concat([Buffer.from(name, "latin1"), data]);
  const ends = Buffer.alloc(8);
  ends.writeUInt32BE(data.length, 0);
  ends.writeUInt32BE(crc32(named), 4);
  return Buffer.concat([ends.subarray(0, 4), named, ends.subarray(4)]);
}
