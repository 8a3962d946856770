export interface StreamOptions {
  /** The reader is done with a chunk when it asks for the next one: the source may use its memory again. */
  lends?: boolean;
}

/** A file that can be read from the start more than once. */
export interface ByteSource {
  name: string;
  sizeBytes: number;
  stream(options?: StreamOptions): AsyncIterable<Uint8Array>;
}

/** A source over bytes already in memory, in chunks of `chunkBytes`. */
export function bytesSource(name: string, bytes: Uint8Array, chunkBytes = 1 << 18): ByteSource {
  async function* stream(): AsyncIterable<Uint8Array> {
    for (let at = 0; at < bytes.length; at += chunkBytes) yield bytes.subarray(at, at + chunkBytes);
  }
  return { name, sizeBytes: bytes.length, stream };
}

/** The same source, telling how many bytes have been taken so far (for progress), counted afresh on each opening. */
export function countedSource(source: ByteSource, onBytes: (taken: number) => void): ByteSource {
  async function* stream(options?: StreamOptions): AsyncIterable<Uint8Array> {
    let taken = 0;
    for await (const chunk of source.stream(options)) {
      taken += chunk.length;
      onBytes(taken);
      yield chunk;
    }
  }
  return { name: source.name, sizeBytes: source.sizeBytes, stream };
}

/** The first `maxBytes` of a source, or all of it when shorter. */
export async function readHead(source: ByteSource, maxBytes: number): Promise<Uint8Array> {
  const chunks: Uint8Array[] = [];
  let length = 0;
  for await (const chunk of source.stream()) {
    chunks.push(chunk);
    length += chunk.length;
    if (length >= maxBytes) break;
  }
  return joinChunks(chunks, Math.min(length, maxBytes));
}

/** Chunks end to end, cut to `length` bytes. */
export function joinChunks(chunks: readonly Uint8Array[], length: number): Uint8Array {
  const joined = new Uint8Array(length);
  let at = 0;
  for (const chunk of chunks) {
    const part = chunk.subarray(0, length - at);
    joined.set(part, at);
    at += part.length;
  }
  return joined;
}
