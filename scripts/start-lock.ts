import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { dirname } from "node:path";

/** The process that holds the lock, when it is still one of ours; a killed start leaves a stale file behind. */
function livingHolder(path: string): { pid: number; address: string } | null {
  if (!existsSync(path)) return null;
  const [pid = "", address = ""] = readFileSync(path, "utf8").split("\n");
  try {
    if (readFileSync(`/proc/${Number(pid)}/cmdline`, "utf8").includes("scripts/")) return { pid: Number(pid), address };
  } catch {
    // No such process.
  }
  return null;
}

/** Takes the checkout for one start. @throws when another start of the same checkout runs. */
export function takeStartLock(path: string): { tell(address: string): void; release(): void } {
  mkdirSync(dirname(path), { recursive: true });
  const holder = livingHolder(path);
  if (holder && holder.pid !== process.pid) {
    throw new Error(
      `Coulterbook already runs from this folder${holder.address ? `: ${holder.address}` : ""} (process ${holder.pid})`,
    );
  }
  writeFileSync(path, `${process.pid}\n`);
  return {
    tell: (address) => writeFileSync(path, `${process.pid}\n${address}\n`),
    release: () => rmSync(path, { force: true }),
  };
}
