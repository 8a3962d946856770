import "server-only";
import { Readable } from "node:stream";
import { ZipFile } from "yazl";
import { withOrganisation } from "@/db/client";
import { listLogFiles, type LogFileRow } from "@/db/queries/log-files";
import { getLogOrThrow } from "@/db/queries/logs";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { uploadKey } from "@/lib/server/logs/log-file";

export interface Original {
  body: ReadableStream<Uint8Array>;
  fileName: string;
  /** Null for several files, which are zipped as they are sent. */
  fileBytes: number | null;
}

/**
 * The file as it was uploaded, streamed; the one named by `sha256` of a log in several, or all of those in a zip.
 * @throws AppError `not_found`
 */
export async function readOriginal(
  container: Container,
  scope: Scope,
  { logId, sha256 }: { logId: string; sha256: string | null },
): Promise<Original> {
  const { log, files } = await withOrganisation(scope, async (tx) => {
    const log = await getLogOrThrow(tx, scope, logId);
    return { log, files: await listLogFiles(tx, scope, log.id) };
  });
  const wanted = sha256 === null ? files : files.filter((file) => file.sha256 === sha256);
  const [first, ...others] = wanted;
  if (!first) throw new AppError("not_found", "This log was not uploaded with such a file.");
  if (others.length > 0) return { body: zipFiles(container, wanted), fileName: `${log.name}.zip`, fileBytes: null };
  const { fileName, fileBytes } = first;
  return { body: streamChunks(container.storage.get(uploadKey(first))), fileName, fileBytes };
}

/** Stored, not packed: the bytes are as they came, and no time goes into a second packing. */
function zipFiles({ storage }: Container, files: readonly LogFileRow[]): ReadableStream<Uint8Array> {
  const zip = new ZipFile();
  for (const file of files) {
    const { fileName, fileBytes } = file;
    const mtime = new Date(Date.UTC(1980, 0, 1));
    // Opened when its turn has come, so that the store is asked for one file at a time.
    zip.addReadStreamLazy(fileName, { compress: false, size: fileBytes, mtime }, (give) => {
      give(null, Readable.from(storage.get(uploadKey(file))));
    });
  }
  zip.end();
  return streamChunks(zip.outputStream as AsyncIterable<Uint8Array> & NodeJS.ReadableStream);
}

function streamChunks(source: AsyncIterable<Uint8Array>): ReadableStream<Uint8Array> {
  const chunks = source[Symbol.asyncIterator]();
  return new ReadableStream<Uint8Array>({
    async pull(controller) {
      const { value, done } = await chunks.next();
      if (done) controller.close();
      else controller.enqueue(value);
    },
    async cancel() {
      await chunks.return?.();
    },
  });
}
