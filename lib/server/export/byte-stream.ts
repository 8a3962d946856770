import { setImmediate } from "node:timers/promises";

/**
 * A web stream of what a generator makes, pulled as the reader takes it; between chunks other requests get their turn.
 * `cleanUp` runs once: at the end, after a fault, or when the reader goes away.
 */
export function toByteStream(
  chunks: AsyncGenerator<Uint8Array>,
  cleanUp: () => Promise<void> = async () => undefined,
): ReadableStream<Uint8Array> {
  return new ReadableStream<Uint8Array>(
    {
      async pull(controller) {
        try {
          await setImmediate();
          const { value, done } = await chunks.next();
          if (!done) return controller.enqueue(value);
        } catch (error) {
          await cleanUp();
          throw error;
        }
        await cleanUp();
        controller.close();
      },
      async cancel() {
        await chunks.return(undefined).catch(() => undefined);
        await cleanUp();
      },
    },
    { highWaterMark: 1 },
  );
}
