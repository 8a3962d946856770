// The cleaning thread of the web process: rules and what follows from them are worked out here, so that no request waits
// for another's log.
import { parentPort } from "node:worker_threads";
import type { CleaningReply, CleaningTask } from "@/lib/server/adjustments/cleaning-task";
import { doCleaningTask } from "@/lib/server/adjustments/do-cleaning-task";

function answer(task: CleaningTask): CleaningReply {
  try {
    return { id: task.id, ok: true, result: doCleaningTask(task) };
  } catch (error) {
    return { id: task.id, ok: false, message: error instanceof Error ? (error.stack ?? error.message) : String(error) };
  }
}

parentPort?.on("message", (task: CleaningTask) => parentPort?.postMessage(answer(task)));
