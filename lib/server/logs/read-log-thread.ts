// The reading thread: all work on a log that takes time happens here, so that it can be watched and killed.
import { parentPort, workerData } from "node:worker_threads";
import { inspectLog, readLog } from "@/lib/ingest";
import type { ByteSource } from "@/lib/ingest/byte-source";
import { inspectParts, readParts } from "@/lib/ingest/read-parts";
import { fail, succeed } from "@/lib/result";
import { packPlacedLog } from "@/lib/logs/packed-placed-log";
import { openStorage, type StorageSettings } from "@/lib/server/adapters/storage/open-storage";
import { buildAnswers, placeLog } from "@/lib/server/logs/build-answers";
import { storedSource } from "@/lib/server/logs/log-file";
import { LogFailure } from "@/lib/server/logs/log-failure";
import { collectSoon } from "@/lib/server/worker/collect-soon";
import type { ThreadMessage, ThreadTask } from "@/lib/server/logs/thread-messages";

const storage = openStorage((workerData as { storage: StorageSettings }).storage);

function say(message: ThreadMessage): void {
  parentPort?.postMessage(message);
}

function tell(stage: string, progress: number): void {
  say({ kind: "progress", stage, progress });
}

/** Each with bytes of its own: the same ones twice were found when they arrived. */
function sourcesOf({ files }: Pick<ThreadTask, "files">): ByteSource[] {
  return files.map((file) => storedSource(storage, file));
}

function readFiles(task: Extract<ThreadTask, { task: "read" }>, onProgress: (fraction: number) => void) {
  const [first, ...others] = sourcesOf(task);
  if (first && others.length === 0) return readLog(first, task.mapping, { onProgress });
  return readParts(sourcesOf(task), task.mapping, { onProgress, areDistinct: true });
}

async function inspect(task: Extract<ThreadTask, { task: "inspect" }>): Promise<void> {
  const near = task.near ?? undefined;
  const [first, ...others] = sourcesOf(task);
  const outcome =
    first && others.length === 0
      ? await inspectLog(first, { near })
      : await inspectParts(sourcesOf(task), { near, areDistinct: true });
  say({ kind: "inspected", outcome });
}

async function read(task: Extract<ThreadTask, { task: "read" }>): Promise<void> {
  let told = 0;
  const onProgress = (fraction: number) => {
    if (Date.now() - told < 100) return;
    told = Date.now();
    tell("Reading the records", 0.05 + 0.45 * fraction);
  };
  const outcome = await readFiles(task, onProgress);
  if (!outcome.ok) return say({ kind: "built", outcome });
  try {
    tell("Placing every row on the ground", 0.5);
    const built = placeLog(outcome.value, task.machine, task);
    // It is stored while this thread works on: writing and statistics then take one time, not two. The readings lie in
    // shared memory and are not copied; from here on nobody writes to them.
    say({ kind: "placed", placed: packPlacedLog(built.placed) });
    const answers = buildAnswers(built, { boundary: task.boundary, tell });
    const records = outcome.value.fileRecords ?? [outcome.value.log.records];
    answers.results.push({ kind: "files", body: { records, parts: outcome.value.fileParts ?? null } });
    say({ kind: "built", outcome: succeed(answers) });
  } catch (error) {
    if (!(error instanceof LogFailure)) throw error;
    say({ kind: "built", outcome: fail(error.place) });
  }
}

parentPort?.on("message", (task: ThreadTask) => {
  const work = task.task === "inspect" ? inspect(task) : read(task).finally(collectSoon);
  work.catch((error: unknown) => {
    say({ kind: "broken", message: error instanceof Error ? (error.stack ?? error.message) : String(error) });
  });
});
