import { countedSource, type ByteSource, type StreamOptions } from "@/lib/ingest/byte-source";
import { IngestFailure, stopReading } from "@/lib/ingest/ingest-error";
import { READ_LIMITS, type ReadOptions } from "@/lib/ingest/log-format";

/** A gzip may unpack to so many times its size; text logs reach about 20. */
const LARGEST_RATIO = 250;

export function isGzip(head: Uint8Array): boolean {
  return head[0] === 0x1f && head[1] === 0x8b;
}

/**
 * The bytes of a text file, unpacked when gzipped, with progress by packed bytes and a stop on `signal`.
 * `sizeBytes` of a gzipped source is a guess.
 */
export function openText(source: ByteSource, options: ReadOptions): ByteSource {
  const counted = countedSource(source, (taken) => {
    if (options.signal?.aborted) stopReading("cancelled", `Reading "${source.name}" was cancelled.`);
    options.onProgress?.(source.sizeBytes > 0 ? Math.min(1, taken / source.sizeBytes) : 1);
  });
  const packed = /\.gz$/i.test(source.name);
  return {
    name: source.name,
    sizeBytes: packed ? source.sizeBytes * 5 : source.sizeBytes,
    stream: (options) => unpackIfGzip(counted, source, options),
  };
}

async function* unpackIfGzip(
  counted: ByteSource,
  source: ByteSource,
  options: StreamOptions | undefined,
): AsyncIterable<Uint8Array> {
  const iterator = counted.stream(options)[Symbol.asyncIterator]();
  let first = await iterator.next();
  while (!first.done && first.value.length === 0) first = await iterator.next();
  const rest = { [Symbol.asyncIterator]: () => iterator };
  try {
    if (first.done) return;
    if (isGzip(first.value)) yield* gunzip(first.value, rest, source);
    else {
      yield first.value;
      yield* rest;
    }
  } finally {
    await iterator.return?.(undefined);
  }
}

/** Unpacks with the platform's own gzip. Stops with `archive-truncated`, `archive-damaged` or `archive-bomb`. */
async function* gunzip(
  first: Uint8Array,
  rest: AsyncIterable<Uint8Array>,
  source: ByteSource,
): AsyncIterable<Uint8Array> {
  const unpacker = new DecompressionStream("gzip");
  const writer = unpacker.writable.getWriter();
  const feeding = feed(writer, first, rest);
  // Awaited below; this keeps an early failure from counting as unhandled.
  feeding.catch(() => undefined);
  const reader = unpacker.readable.getReader();
  let unpacked = 0;
  try {
    for (;;) {
      const { done, value } = await reader.read();
      if (done) break;
      unpacked += value.length;
      checkSize(unpacked, source);
      yield value;
    }
    await feeding;
  } catch (error) {
    throw toGzipFailure(error, source.name);
  } finally {
    reader.cancel().catch(() => undefined);
    writer.abort().catch(() => undefined);
  }
}

async function feed(
  writer: WritableStreamDefaultWriter<BufferSource>,
  first: Uint8Array,
  rest: AsyncIterable<Uint8Array>,
): Promise<void> {
  try {
    // Copies: what is written may wait, and a lent chunk does not.
    await writer.write(new Uint8Array(first));
    for await (const chunk of rest) await writer.write(new Uint8Array(chunk));
    await writer.close();
  } catch (error) {
    await writer.abort(error).catch(() => undefined);
    throw error;
  }
}

function checkSize(unpacked: number, source: ByteSource): void {
  const tooDense = unpacked > 64 * 1024 * 1024 && unpacked > source.sizeBytes * LARGEST_RATIO;
  if (!tooDense && unpacked <= READ_LIMITS.unpackedBytes) return;
  stopReading(
    "archive-bomb",
    `"${source.name}" unpacks to more than ${tooDense ? `${LARGEST_RATIO} times its size` : "2 GB"}, which no log does. Upload the log unpacked, or in parts.`,
  );
}

function toGzipFailure(error: unknown, name: string): Error {
  if (error instanceof IngestFailure) return error;
  const isCut = error instanceof Error && /unexpected end|Z_BUF_ERROR/i.test(`${error.message} ${String(error.cause)}`);
  return new IngestFailure({
    code: isCut ? "archive-truncated" : "archive-damaged",
    message: isCut
      ? `The gzip file "${name}" ends before its end: it was cut short on the way. Upload it again from the original.`
      : `The gzip file "${name}" is damaged and cannot be unpacked. Upload it again from the original.`,
  });
}
