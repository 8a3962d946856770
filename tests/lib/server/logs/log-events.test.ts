import { describe, expect, it } from "vitest";
import { eventBody } from "@/lib/server/logs/log-events";

const decoder = new TextDecoder();

/** One event at once; the next only when `release` is called. */
function slowEvents() {
  let release = () => {};
  const gate = new Promise<void>((resolve) => (release = resolve));
  async function* events() {
    yield "data: 1\n\n";
    await gate;
    yield "data: 2\n\n";
  }
  return { events: events(), release };
}

describe("a stream of events", () => {
  it("is left without a fault while its next event is awaited", async () => {
    const faults: unknown[] = [];
    const listen = (fault: unknown) => faults.push(fault);
    process.on("unhandledRejection", listen);
    const { events, release } = slowEvents();
    const reader = eventBody(events).getReader();
    expect(decoder.decode((await reader.read()).value)).toBe("data: 1\n\n");
    const waiting = reader.read();
    await reader.cancel();
    release();
    expect(await waiting).toEqual({ done: true, value: undefined });
    await new Promise((resolve) => setTimeout(resolve, 20));
    process.off("unhandledRejection", listen);
    expect(faults).toEqual([]);
  });

  it("ends where the log can no longer be read", async () => {
    async function* events() {
      yield "data: 1\n\n";
      throw new Error("gone");
    }
    expect(await new Response(eventBody(events())).text()).toBe("data: 1\n\n");
  });
});
