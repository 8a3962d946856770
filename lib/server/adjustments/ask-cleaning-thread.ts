import { resolve } from "node:path";
import { Worker } from "node:worker_threads";
import type { Environment } from "@/lib/server/env";
import type { CleaningReply, CleaningResults, CleaningTask } from "@/lib/server/adjustments/cleaning-task";

interface Waiting {
  settle: (result: CleaningResults[CleaningTask["kind"]]) => void;
  refuse: (error: Error) => void;
}

interface Thread {
  worker: Worker;
  waiting: Map<number, Waiting>;
}

// One thread a process, also across hot reloads and Next's separately bundled routes.
const shared = globalThis as typeof globalThis & {
  coulterbookCleaning?: { thread?: Thread; asked: number };
};
const state = (shared.coulterbookCleaning ??= { asked: 0 });

/** Asks the cleaning thread of this process, starting it when there is none; tasks are taken one after the other. */
export function askCleaningThread<Kind extends CleaningTask["kind"]>(
  { BUILD_DIR }: Pick<Environment, "BUILD_DIR">,
  task: Omit<CleaningTask, "id" | "kind"> & { kind: Kind },
): Promise<CleaningResults[Kind]> {
  const thread = (state.thread ??= startThread(resolve(BUILD_DIR, "cleaning-thread.mjs")));
  const id = ++state.asked;
  return new Promise((settle, refuse) => {
    thread.waiting.set(id, {
      settle: (result) => settle(result as CleaningResults[Kind]),
      refuse,
    });
    thread.worker.ref();
    thread.worker.postMessage({ ...task, id } satisfies CleaningTask);
  });
}

function startThread(path: string): Thread {
  const worker = new Worker(path, { execArgv: [] });
  const thread: Thread = { worker, waiting: new Map() };
  const fail = (error: Error) => {
    if (state.thread === thread) state.thread = undefined;
    for (const { refuse } of thread.waiting.values()) refuse(error);
    thread.waiting.clear();
  };
  worker.on("message", (reply: CleaningReply) => {
    const asked = thread.waiting.get(reply.id);
    thread.waiting.delete(reply.id);
    if (thread.waiting.size === 0) worker.unref();
    if (reply.ok) asked?.settle(reply.result);
    else asked?.refuse(new Error(`cleaning thread: ${reply.message}`));
  });
  worker.on("error", fail);
  worker.on("exit", () => fail(new Error("the cleaning thread ended")));
  worker.unref();
  return thread;
}
