import type { z } from "zod";
import type { Transaction } from "@/db/client";
import { listLogFiles } from "@/db/queries/log-files";
import { findLogResult } from "@/db/queries/log-results";
import type { LogRow } from "@/db/queries/logs";
import type { FilePart, LogFileParts } from "@/lib/logs/file-parts";
import type { LogFileBody } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";

/** What was stored of the files when a version was read; `parts` is not there in versions made before it was kept. */
type Counted = { records: number[]; parts?: FilePart[] | null } | null;

async function findCounted(tx: Transaction, scope: Scope, log: Pick<LogRow, "id" | "version">): Promise<Counted> {
  return (await findLogResult(tx, scope, { logId: log.id, version: log.version, kind: "files" })) as Counted;
}

/** Which records came from which file; null for a log of one file. */
export async function findFileParts(
  tx: Transaction,
  scope: Scope,
  log: Pick<LogRow, "id" | "version">,
): Promise<LogFileParts | null> {
  const files = (await listLogFiles(tx, scope, log.id)).length;
  if (files < 2) return null;
  return { files, parts: (await findCounted(tx, scope, log))?.parts ?? null };
}

/** The files a log was uploaded as, with how many records the version that readers see took from each. */
export async function describeLogFiles(
  tx: Transaction,
  scope: Scope,
  log: Pick<LogRow, "id" | "version" | "counts">,
): Promise<z.infer<typeof LogFileBody>[]> {
  const files = await listLogFiles(tx, scope, log.id);
  const counted = await findCounted(tx, scope, log);
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
