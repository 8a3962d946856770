// The looking thread of the worker: a second look at a log that is ready already, so that reading another need not wait.
import { parentPort } from "node:worker_threads";
import { doLookTask } from "@/lib/server/alignment/do-look-task";
import type { LookReply, LookTask } from "@/lib/server/alignment/look-task";

function answer(task: LookTask): LookReply {
  try {
    return { ok: true, result: doLookTask(task) };
  } catch (error) {
    return { ok: false, message: error instanceof Error ? (error.stack ?? error.message) : String(error) };
  }
}

parentPort?.on("message", (task: LookTask) => parentPort?.postMessage(answer(task)));
