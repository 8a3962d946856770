import { resolve } from "node:path";
import { Worker } from "node:worker_threads";
import type { LookReply, LookResults, LookTask } from "@/lib/server/alignment/look-task";
import type { Environment } from "@/lib/server/env";

/** One looking thread; it lives as long as one look, so that its memory goes with it. */
export interface LookThread {
  /** @throws where the task fails, the thread breaks, or the signal aborts (with its reason, the thread killed) */
  ask<Kind extends LookTask["kind"]>(task: Extract<LookTask, { kind: Kind }>): Promise<LookResults[Kind]>;
  close(): Promise<void>;
}

export function openLookThread(
  { BUILD_DIR, WORKER_MEMORY_MIB }: Pick<Environment, "BUILD_DIR" | "WORKER_MEMORY_MIB">,
  signal: AbortSignal,
): LookThread {
  const worker = new Worker(resolve(BUILD_DIR, "look-thread.mjs"), {
    execArgv: [],
    resourceLimits: { maxOldGenerationSizeMb: WORKER_MEMORY_MIB },
  });
  // A thread that breaks between two tasks is noticed by the next one.
  worker.on("error", () => undefined);
  return {
    ask: (task) =>
      new Promise((settle, refuse) => {
        const finish = (act: () => void) => {
          worker.off("message", onMessage).off("error", onError).off("exit", onExit);
          signal.removeEventListener("abort", onAbort);
          act();
        };
        const onMessage = (reply: LookReply) =>
          finish(() =>
            reply.ok ? settle(reply.result as never) : refuse(new Error(`looking thread: ${reply.message}`)),
          );
        const onError = (error: Error) => finish(() => refuse(error));
        const onExit = () => finish(() => refuse(new Error("the looking thread ended")));
        const onAbort = () => finish(() => void worker.terminate().then(() => refuse(signal.reason as Error)));
        worker.on("message", onMessage).on("error", onError).on("exit", onExit);
        signal.addEventListener("abort", onAbort, { once: true });
        if (signal.aborted) onAbort();
        else worker.postMessage(task);
      }),
    close: async () => {
      await worker.terminate();
    },
  };
}
