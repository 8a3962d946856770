import { resolve } from "node:path";
import { Worker } from "node:worker_threads";
import type { IngestError } from "@/lib/ingest/ingest-error";
import type { Inspection } from "@/lib/ingest/log-format";
import type { Result } from "@/lib/result";
import { storageSettings } from "@/lib/server/adapters/storage/open-storage";
import type { Environment } from "@/lib/server/env";
import type { PackedPlacedLog } from "@/lib/logs/packed-placed-log";
import type { BuiltAnswers } from "@/lib/server/logs/built-answers";
import { LogFailure, type LogErrorPlace } from "@/lib/server/logs/log-failure";
import type { ThreadMessage, ThreadTask } from "@/lib/server/logs/thread-messages";

const WATCH_MS = 200;
const MEBIBYTE = 1024 * 1024;

interface AskOptions {
  signal: AbortSignal;
  onProgress(stage: string, progress: number): void;
  /** The log stands on the ground; what is told about it follows. */
  onPlaced?(placed: PackedPlacedLog): void;
}

type Answer = Exclude<ThreadMessage, { kind: "progress" } | { kind: "placed" }>;

/** One reading thread. It is killed when it takes too long or too much memory, when it breaks, and on a signal. */
export class LogThread {
  private readonly worker: Worker;
  private isUsable = true;

  constructor(private readonly env: Environment) {
    this.worker = new Worker(resolve(env.BUILD_DIR, "read-log-thread.mjs"), {
      workerData: { storage: storageSettings(env) },
      // What a log leaves behind young is little; more room for it only keeps memory busy.
      resourceLimits: { maxOldGenerationSizeMb: env.WORKER_MEMORY_MIB, maxYoungGenerationSizeMb: 16 },
      execArgv: [],
    });
    this.worker.on("error", () => (this.isUsable = false));
    this.worker.on("exit", () => (this.isUsable = false));
    this.worker.unref();
  }

  get usable(): boolean {
    return this.isUsable;
  }

  async inspect(task: Omit<Extract<ThreadTask, { task: "inspect" }>, "task">, options: AskOptions) {
    const answer = await this.ask({ task: "inspect", ...task }, options);
    return (answer as { outcome: Result<Inspection, IngestError> }).outcome;
  }

  async read(task: Omit<Extract<ThreadTask, { task: "read" }>, "task">, options: AskOptions) {
    const answer = await this.ask({ task: "read", ...task }, options);
    return (answer as { outcome: Result<BuiltAnswers, LogErrorPlace> }).outcome;
  }

  /** Ends the thread at once, whatever it does. */
  async kill(): Promise<void> {
    this.isUsable = false;
    await this.worker.terminate();
  }

  private ask(task: ThreadTask, options: AskOptions): Promise<Answer> {
    return new Promise((settle, refuse) => {
      const finish = (act: () => void) => {
        clearInterval(watch);
        options.signal.removeEventListener("abort", onAbort);
        this.worker.off("message", onMessage).off("error", onError).off("exit", onExit);
        this.worker.unref();
        act();
      };
      const killWith = (error: unknown) => finish(() => void this.kill().then(() => refuse(error)));
      const onAbort = () => killWith(options.signal.reason);
      const watch = this.watchLimits(killWith);
      const onMessage = (message: ThreadMessage) => {
        if (message.kind === "progress") return options.onProgress(message.stage, message.progress);
        if (message.kind === "placed") return options.onPlaced?.(message.placed);
        if (message.kind === "broken") return killWith(brokenFailure(message.message));
        finish(() => settle(message));
      };
      const onError = (error: Error) => finish(() => refuse(crashFailure(error, this.env)));
      const onExit = () => finish(() => refuse(brokenFailure("the reading thread ended")));
      this.worker.on("message", onMessage).on("error", onError).on("exit", onExit);
      options.signal.addEventListener("abort", onAbort, { once: true });
      this.worker.ref();
      if (options.signal.aborted) onAbort();
      else this.worker.postMessage(task);
    });
  }

  private watchLimits(killWith: (error: LogFailure) => void): NodeJS.Timeout {
    const started = Date.now();
    const limitBytes = this.env.WORKER_MEMORY_MIB * MEBIBYTE;
    return setInterval(() => {
      if (Date.now() - started > this.env.READ_LIMIT_S * 1000) killWith(timeFailure(this.env.READ_LIMIT_S));
      // Typed arrays live outside the heap that resourceLimits counts, so the whole process is watched.
      else if (process.memoryUsage.rss() > limitBytes) killWith(memoryFailure(this.env.WORKER_MEMORY_MIB));
    }, WATCH_MS);
  }
}

function timeFailure(seconds: number): LogFailure {
  const message = `Reading this log took longer than the ${seconds} s one log may take. Split the file, or ask whoever runs this server to raise READ_LIMIT_S.`;
  return new LogFailure({ code: "took-too-long", message });
}

function memoryFailure(mebibytes: number): LogFailure {
  const message = `Reading this log needs more than the ${mebibytes} MiB of memory one log may take. Split the file, or ask whoever runs this server to raise WORKER_MEMORY_MIB.`;
  return new LogFailure({ code: "out-of-memory", message });
}

function brokenFailure(detail: string): LogFailure {
  console.error(`reading thread: ${detail}`);
  const message =
    "Reading this log broke off because of a fault in the program. The file is kept; the fault has been written down.";
  return new LogFailure({ code: "reader-broke", message });
}

function crashFailure(error: Error, env: Environment): LogFailure {
  const isMemory = "code" in error && error.code === "ERR_WORKER_OUT_OF_MEMORY";
  return isMemory ? memoryFailure(env.WORKER_MEMORY_MIB) : brokenFailure(error.stack ?? error.message);
}
