import "server-only";
import type { Log } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { isBusy } from "@/lib/server/logs/describe-log";
import { getLog } from "@/lib/server/logs/read-logs";

const LOOK_MS = 300;
const HEARTBEAT_MS = 10_000;

const pause = (milliseconds: number) => new Promise((resolve) => setTimeout(resolve, milliseconds));

/**
 * A log's state as server-sent events, one a change, until it is settled. Each look is made under the caller's scope: who
 * loses access sees the stream end.
 */
export async function* watchLog(
  container: Container,
  scope: Scope,
  input: { logId: string; first: Log; signal: AbortSignal },
): AsyncGenerator<string> {
  let log = input.first;
  let said = "";
  let saidAt = Date.now();
  // A short answer to a stream that is cut: the browser asks again after this long.
  yield "retry: 2000\n\n";
  while (!input.signal.aborted) {
    const text = JSON.stringify(log);
    if (text !== said) {
      yield `data: ${text}\n\n`;
      said = text;
      saidAt = Date.now();
    } else if (Date.now() - saidAt > HEARTBEAT_MS) {
      yield ": still at work\n\n";
      saidAt = Date.now();
    }
    if (!isBusy(log.status)) return;
    await pause(LOOK_MS);
    log = await getLog(container, scope, input.logId);
  }
}

/** The events as a body; a log that vanishes meanwhile ends it. A reader may leave while the next event is awaited. */
export function eventBody(events: AsyncGenerator<string>): ReadableStream<Uint8Array> {
  const encoder = new TextEncoder();
  let hasLeft = false;
  return new ReadableStream({
    async pull(controller) {
      const next = await events.next().catch(() => ({ done: true, value: undefined }));
      if (hasLeft) return;
      if (next.done || next.value === undefined) controller.close();
      else controller.enqueue(encoder.encode(next.value));
    },
    cancel() {
      hasLeft = true;
      void events.return(undefined);
    },
  });
}
