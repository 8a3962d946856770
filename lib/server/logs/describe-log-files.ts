import type { z } from "zod";
import type { Transaction } from "@/db/client";
import { listLogFiles } from "@/db/queries/log-files";
import { findLogResult } from "@/db/queries/log-results";
import type { LogRow } from "@/db/queries/logs";
import type { LogFileBody } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";

/** The files a log was uploaded as, with how many records the version that readers see took from each. */
export async function describeLogFiles(
  tx: Transaction,
  scope: Scope,
  log: Pick<LogRow, "id" | "version" | "counts">,
): Promise<z.infer<typeof LogFileBody>[]> {
  const files = await listLogFiles(tx, scope, log.id);
  const counted = (await findLogResult(tx, scope, { logId: log.id, version: log.version, kind: "files" })) as {
    records: number[];
  } | null;
  // Versions made before files were counted one by one: a log of one file has them all.
  const whole = files.length === 1 && log.version > 0 ? log.counts.records : null;
  return files.map(({ fileName, fileBytes, sha256, copies }, part) => ({
    name: fileName,
    bytes: fileBytes,
    sha256,
    records: counted?.records[part] ?? whole,
    copies,
  }));
}
