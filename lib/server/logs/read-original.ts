import "server-only";
import { withOrganisation } from "@/db/client";
import { getLogOrThrow } from "@/db/queries/logs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { uploadKey } from "@/lib/server/logs/log-file";

/** The file as it was uploaded, streamed. @throws AppError `not_found` */
export async function readOriginal(
  container: Container,
  scope: Scope,
  logId: string,
): Promise<{ body: ReadableStream<Uint8Array>; fileName: string; fileBytes: number }> {
  const log = await withOrganisation(scope, (tx) => getLogOrThrow(tx, scope, logId));
  const chunks = container.storage.get(uploadKey(log))[Symbol.asyncIterator]();
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const { value, done } = await chunks.next();
      if (done) controller.close();
      else controller.enqueue(value);
    },
    async cancel() {
      await chunks.return?.();
    },
  });
  return { body, fileName: log.fileName, fileBytes: log.fileBytes };
}
