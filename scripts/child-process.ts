import { spawn, type ChildProcess } from "node:child_process";
import { once } from "node:events";

/** A program that this one started and answers for. */
export interface Child {
  name: string;
  process: ChildProcess;
  /** What it wrote to its standard error so far; empty unless started with `keepsErrors`. */
  errors(): string;
  /** Resolves when the program says `{ready: true}`. @throws when it ends before. */
  ready: Promise<void>;
  stop(graceMs?: number): Promise<void>;
}

function waitUntilReady(name: string, child: ChildProcess): Promise<void> {
  return new Promise((resolve, reject) => {
    child.on("message", (message: unknown) => {
      if (typeof message === "object" && message !== null && "ready" in message) resolve();
    });
    child.once("error", reject);
    child.once("exit", (code, signal) => reject(new Error(`${name} ended before it was ready (${signal ?? code})`)));
  });
}

/**
 * Memory of 128 KB and more goes back to the system at once when it is freed. Left alone, glibc raises that bound to the largest
 * piece freed so far, and the readings of past logs stay in its hands. Other systems overlook the name.
 */
const GIVES_BACK = { MALLOC_MMAP_THRESHOLD_: "131072" };

/**
 * Starts a Node program that ends with this one: an open channel ties them, so that even kill -9 leaves no orphan.
 * @param input.script a compiled program, or the entry file of an installed tool
 */
export function startNode(input: {
  name: string;
  script: string;
  arguments?: string[];
  environment: NodeJS.ProcessEnv;
  quiet?: boolean;
  /** Standard error is kept for whoever started it, beside being shown. */
  keepsErrors?: boolean;
}): Child {
  const output = input.quiet ? "ignore" : "inherit";
  const preload = new URL("./exit-with-parent.mjs", import.meta.url).href;
  const child = spawn(process.execPath, ["--import", preload, input.script, ...(input.arguments ?? [])], {
    env: { ...GIVES_BACK, ...input.environment, EXIT_WITH_PARENT: String(process.pid) },
    stdio: ["ignore", output, input.keepsErrors ? "pipe" : "inherit", "ipc"],
  });
  let errors = "";
  child.stderr?.on("data", (chunk: Buffer) => {
    errors += chunk.toString("utf8");
    process.stderr.write(chunk);
  });
  const ready = waitUntilReady(input.name, child);
  ready.catch(() => undefined);
  return {
    name: input.name,
    process: child,
    errors: () => errors,
    ready,
    stop: (graceMs = 10_000) => stopChild(child, graceMs),
  };
}

async function stopChild(child: ChildProcess, graceMs: number): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const ended = once(child, "exit");
  child.kill("SIGTERM");
  const timer = setTimeout(() => child.kill("SIGKILL"), graceMs);
  await ended;
  clearTimeout(timer);
}

/** Runs a Node program to its end. @throws when it fails. */
export async function runNode(input: {
  name: string;
  script: string;
  arguments?: string[];
  environment: NodeJS.ProcessEnv;
}): Promise<void> {
  const child = startNode(input);
  const [code, signal] = (await once(child.process, "exit")) as [number | null, string | null];
  if (code !== 0) throw new Error(`${input.name} failed (${signal ?? code})`);
}

/** Waits until an address answers at all. @throws after `limitMs`, or when `child` ends. */
export async function waitForAnswer(url: string, child: Child, limitMs: number): Promise<void> {
  const until = Date.now() + limitMs;
  while (Date.now() < until) {
    if (child.process.exitCode !== null) throw new Error(`${child.name} ended before it answered`);
    try {
      await fetch(url, { signal: AbortSignal.timeout(20_000), redirect: "manual" });
      return;
    } catch {
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
  }
  throw new Error(`${child.name} did not answer at ${url} within ${limitMs / 1000} s`);
}
