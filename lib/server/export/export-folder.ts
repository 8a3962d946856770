import { mkdir, mkdtemp, readdir, rm, stat } from "node:fs/promises";
import path from "node:path";
import { AppError } from "@/lib/errors";

/** Exports written to disk at the same time by one process. */
const AT_ONCE = 3;
/** A folder this old was left behind by a process that died. */
const LEFT_BEHIND_MS = 24 * 60 * 60_000;

let writing = 0;

/** Something made in a folder of its own, which is there until `remove`. */
export interface MadeInFolder<Made> {
  made: Made;
  remove: () => Promise<void>;
}

/** Makes an export in a folder of its own; nothing is left of one that fails. @throws AppError `too_many_requests` */
export async function makeInFolder<Made>(
  dataDir: string,
  make: (folder: string) => Promise<Made>,
): Promise<MadeInFolder<Made>> {
  if (writing >= AT_ONCE) {
    throw new AppError("too_many_requests", "Several exports are being made just now. Try again in a minute.", {
      detailCode: "exports_busy",
      extra: { retryAfterS: 60 },
    });
  }
  writing += 1;
  try {
    const root = path.resolve(dataDir, "exports");
    await mkdir(root, { recursive: true });
    await removeLeftBehind(root);
    const folder = await mkdtemp(path.join(root, "export-"));
    const remove = () => rm(folder, { recursive: true, force: true });
    try {
      return { made: await make(folder), remove };
    } catch (error) {
      await remove();
      throw error;
    }
  } finally {
    writing -= 1;
  }
}

async function removeLeftBehind(root: string): Promise<void> {
  for (const name of await readdir(root)) {
    const folder = path.join(root, name);
    // Another export may remove its own meanwhile.
    const ageMs = await stat(folder).then(
      (found) => Date.now() - found.mtimeMs,
      () => 0,
    );
    if (ageMs > LEFT_BEHIND_MS) await rm(folder, { recursive: true, force: true });
  }
}
