import type { Readable } from "node:stream";

/** A field of a row as PostgreSQL sent it; null for NULL. */
export type BinaryField = Buffer | null;

const HEADER_BYTES = 19;

/** Rows of a binary COPY TO, in order. The answer is held in memory once; fields are views of it, not aligned. */
export async function readBinaryCopy(source: Readable): Promise<BinaryField[][]> {
  const chunks: Buffer[] = [];
  for await (const chunk of source) chunks.push(chunk as Buffer);
  const all = Buffer.concat(chunks);
  const rows: BinaryField[][] = [];
  let at = HEADER_BYTES;
  for (let fields = all.readInt16BE(at); fields >= 0; fields = all.readInt16BE(at)) {
    at += 2;
    const row: BinaryField[] = [];
    for (let field = 0; field < fields; field++) {
      const length = all.readInt32BE(at);
      at += 4;
      row.push(length < 0 ? null : all.subarray(at, at + length));
      at += Math.max(0, length);
    }
    rows.push(row);
  }
  return rows;
}
