import type { Dirent } from "node:fs";
import {
  access,
  copyFile,
  link,
  mkdir,
  open,
  readdir,
  rename,
  rm,
  stat,
  unlink,
  type FileHandle,
} from "node:fs/promises";
import { dirname, join, sep } from "node:path";
import { nanoid } from "nanoid";
import { AppError } from "@/lib/errors";
import type { GetOptions, ObjectRange, ObjectStorage } from "@/lib/ports/object-storage";

/** Bytes gathered before they are written, and read at a time: large enough that calls cost nothing. */
const BLOCK_BYTES = 1024 * 1024;
/** Objects that are still being written, beside the folder of the finished ones. */
const UNFINISHED = ".unfinished";

function isMissing(error: unknown): boolean {
  const code = error instanceof Error && "code" in error ? error.code : "";
  return code === "ENOENT" || code === "ENOTDIR";
}

/** Files in a folder of this machine, one an object: for installations where web and worker share a disk. */
export class FolderStorage implements ObjectStorage {
  constructor(private readonly folder: string) {}

  async put(
    key: string,
    body: AsyncIterable<Uint8Array> | Uint8Array,
    options: { signal?: AbortSignal; contentType?: string } = {},
  ): Promise<{ bytes: number }> {
    const path = this.pathOf(key);
    const part = await this.newPart();
    try {
      const file = await open(part, "wx");
      let bytes = 0;
      try {
        bytes = await writeAll(file, body instanceof Uint8Array ? [body] : body, options.signal);
        // An upload that was answered outlives a crash, as the database's rows do.
        await file.datasync();
      } finally {
        await file.close();
      }
      options.signal?.throwIfAborted();
      await mkdir(dirname(path), { recursive: true });
      await rename(part, path);
      return { bytes };
    } catch (error) {
      await rm(part, { force: true });
      throw error;
    }
  }

  async *get(key: string, range?: ObjectRange, options: GetOptions = {}): AsyncIterable<Uint8Array> {
    const file = await this.openToRead(key);
    try {
      let at = range?.start ?? 0;
      const end = range ? range.end + 1 : Infinity;
      const lent = options.lends ? Buffer.allocUnsafe(BLOCK_BYTES) : null;
      while (at < end) {
        const wanted = Math.min(BLOCK_BYTES, end - at);
        const { bytesRead, buffer } = await file.read(lent ?? Buffer.allocUnsafe(wanted), 0, wanted, at);
        if (bytesRead === 0) return;
        at += bytesRead;
        yield buffer.subarray(0, bytesRead);
      }
    } finally {
      await file.close();
    }
  }

  private async openToRead(key: string): Promise<FileHandle> {
    try {
      return await open(this.pathOf(key), "r");
    } catch (cause) {
      if (isMissing(cause)) throw new AppError("not_found", "The file is not in the store", { cause });
      throw new AppError("unavailable", "The file store does not answer", { cause });
    }
  }

  async head(key: string): Promise<{ bytes: number } | null> {
    try {
      const { size } = await stat(this.pathOf(key));
      return { bytes: size };
    } catch (error) {
      if (isMissing(error)) return null;
      throw error;
    }
  }

  /** A second name for the same bytes where the disk has such a thing: nobody writes into a finished object. */
  async copy(from: string, to: string): Promise<void> {
    const path = this.pathOf(to);
    const part = await this.newPart();
    await mkdir(dirname(path), { recursive: true });
    try {
      await link(this.pathOf(from), part).catch(() => copyFile(this.pathOf(from), part));
    } catch (cause) {
      if (isMissing(cause)) throw new AppError("not_found", "The file is not in the store", { cause });
      throw cause;
    }
    await rename(part, path);
    // Renaming onto another name of the same bytes does nothing and leaves the first.
    await unlink(part).catch(() => undefined);
  }

  async delete(key: string): Promise<void> {
    await rm(this.pathOf(key), { force: true });
  }

  async *list(prefix: string): AsyncIterable<{ key: string; bytes: number; modifiedAt: Date | null }> {
    const root = join(this.folder, "objects");
    const from = prefix.slice(0, prefix.lastIndexOf("/") + 1);
    for (const entry of await this.entriesUnder(join(root, from))) {
      if (!entry.isFile()) continue;
      const path = join(entry.parentPath, entry.name);
      const key = path
        .slice(root.length + 1)
        .split(sep)
        .join("/");
      const found = key.startsWith(prefix) ? await stat(path).catch(() => null) : null;
      if (found) yield { key, bytes: found.size, modifiedAt: found.mtime };
    }
  }

  private async entriesUnder(folder: string): Promise<Dirent[]> {
    try {
      return await readdir(folder, { recursive: true, withFileTypes: true });
    } catch (error) {
      if (isMissing(error)) return [];
      throw error;
    }
  }

  async ping(): Promise<void> {
    await mkdir(join(this.folder, UNFINISHED), { recursive: true });
    await access(this.folder);
  }

  private async newPart(): Promise<string> {
    const folder = join(this.folder, UNFINISHED);
    await mkdir(folder, { recursive: true });
    return join(folder, nanoid());
  }

  /** Keys are made by this program; one that would leave the folder is a fault of it. */
  private pathOf(key: string): string {
    const steps = key.split("/");
    if (steps.some((step) => step === "" || step === "." || step === "..")) throw new RangeError(`no key: ${key}`);
    return join(this.folder, "objects", ...steps);
  }
}

/** Writes chunks in blocks; the first block is on its way while the next one is gathered. */
async function writeAll(
  file: FileHandle,
  body: AsyncIterable<Uint8Array> | Iterable<Uint8Array>,
  signal: AbortSignal | undefined,
): Promise<number> {
  let bytes = 0;
  let gathered: Uint8Array[] = [];
  let gatheredBytes = 0;
  let writing: Promise<void> = Promise.resolve();
  const flush = async () => {
    const block = gathered;
    const size = gatheredBytes;
    [gathered, gatheredBytes] = [[], 0];
    await writing;
    if (size > 0) writing = writeBlock(file, block, size);
    writing.catch(() => undefined);
  };
  try {
    for await (const chunk of body) {
      signal?.throwIfAborted();
      bytes += chunk.length;
      gathered.push(chunk);
      gatheredBytes += chunk.length;
      if (gatheredBytes >= BLOCK_BYTES) await flush();
    }
    await flush();
  } finally {
    await writing;
  }
  return bytes;
}

async function writeBlock(file: FileHandle, chunks: Uint8Array[], size: number): Promise<void> {
  const { bytesWritten } = await file.writev(chunks);
  if (bytesWritten === size) return;
  // A full disk takes part of a block without a word; writing the rest says why.
  await file.writeFile(Buffer.concat(chunks, size).subarray(bytesWritten));
}
