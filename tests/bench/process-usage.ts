import { readdirSync, readFileSync, writeFileSync } from "node:fs";

/** Clock ticks a second of the figures in /proc (Linux, USER_HZ). */
const TICKS_PER_S = 100;

/** Forgets the highest memory so far. Needs the rights to do so; without them the peak covers all rounds. */
export function resetPeak(pid: number): void {
  try {
    writeFileSync(`/proc/${pid}/clear_refs`, "5");
  } catch {
    // The peak then includes what came before.
  }
}

/** Highest resident memory of a process. */
export function peakBytes(pid: number): number {
  const kibibytes = /VmHWM:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, "utf8"))?.[1];
  return Number(kibibytes) * 1024;
}

/** Fields of /proc/<pid>/stat after the name: [0] state, [1] parent, [11] user, [12] system, [13], [14] of ended children. */
function statOf(pid: number): string[] | null {
  try {
    return readFileSync(`/proc/${pid}/stat`, "utf8")
      .replace(/^.*\) /s, "")
      .split(" ");
  } catch {
    return null;
  }
}

function commandOf(pid: number): string {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, "utf8").replaceAll("\0", " ");
  } catch {
    return "";
  }
}

/** Patterns of the command lines of what one upload keeps busy. */
const WATCHED = {
  web: /web\.mjs/,
  worker: /worker\.mjs/,
  store: /fakes\.mjs/,
  postgres: /postgres.*bench-postgres/,
} as const;
export type WatchedProcess = keyof typeof WATCHED;

/** Process numbers of the parts of a server that this process started, and of the database cluster. */
export function watchedProcesses(): Record<WatchedProcess, number> {
  const pids = readdirSync("/proc").map(Number).filter(Number.isInteger);
  const find = (name: WatchedProcess) =>
    pids.find((pid) => {
      const isOurs = name === "postgres" || statOf(pid)?.[1] === String(process.pid);
      return isOurs && WATCHED[name].test(commandOf(pid));
    }) ?? 0;
  return { web: find("web"), worker: find("worker"), store: find("store"), postgres: find("postgres") };
}

/** Processor seconds of a process with its children, those that run and those that ended. */
export function processorS(pid: number): number {
  const own = statOf(pid);
  if (!own) return 0;
  const pids = readdirSync("/proc").map(Number).filter(Number.isInteger);
  const children = pids.map(statOf).filter((stat) => stat?.[1] === String(pid));
  const sum = (fields: readonly string[], from: number, end: number) =>
    fields.slice(from, end).reduce((total, text) => total + Number(text), 0);
  const ofChildren = children.reduce((total, child) => total + sum(child ?? [], 11, 13), 0);
  return (sum(own, 11, 15) + ofChildren) / TICKS_PER_S;
}
