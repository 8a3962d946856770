import "server-only";

/** What is still taken off the wire of a refused request, so that its sender gets to read the refusal. */
const LEAVE_BYTES = 64 * 1024 * 1024;
const LEAVE_MS = 10_000;

/**
 * The body of a request, chunk by chunk. Whoever stops early answers at once; what still comes is thrown away for a
 * while. A body must not be cancelled while a read is under way: the platform then closes its stream twice, which ends in
 * an uncaught exception, and closes the connection before the answer is sent.
 */
export async function* requestChunks(body: ReadableStream<Uint8Array>): AsyncGenerator<Uint8Array, void, void> {
  const reader = body.getReader();
  let isOver = false;
  try {
    for (;;) {
      const { done, value } = await reader.read().catch((error: unknown) => {
        isOver = true;
        throw error;
      });
      if (done) {
        isOver = true;
        return;
      }
      yield value;
    }
  } finally {
    if (!isOver) void leaveRest(reader);
  }
}

/** Reads on without keeping anything; never throws. */
async function leaveRest(reader: ReadableStreamDefaultReader<Uint8Array>): Promise<void> {
  const until = Date.now() + LEAVE_MS;
  let bytes = 0;
  try {
    while (bytes < LEAVE_BYTES && Date.now() < until) {
      const { done, value } = await reader.read();
      if (done) return;
      bytes += value.length;
    }
    await reader.cancel();
  } catch {
    // The sender is gone: nobody is left to be told.
  }
}
