import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { insertLogFiles, isFileInUse } from "@/db/queries/log-files";
import { findSameBytes, insertLog, lockBytes } from "@/db/queries/logs";
import { AppError } from "@/lib/errors";
import { newId } from "@/lib/ids";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";
import { demandMachine } from "@/lib/server/logs/change-log";
import { distinctFiles, hashOfSet } from "@/lib/server/logs/distinct-files";
import { nameFiles, uploadKey } from "@/lib/server/logs/log-file";
import { readMapping } from "@/lib/server/logs/map-columns";
import { noteReadLog, sendReadLog } from "@/lib/server/logs/queue-log";
import { receiveUpload, type ReceivedFile } from "@/lib/server/logs/receive-upload";
import { refuseUnstorable } from "@/lib/storable-text";

interface UploadInput {
  fieldId: string;
  /** Take bytes that the field has already. */
  again: boolean;
  /** Several files are parts of one log. */
  together: boolean;
  request: Request;
}

/** A log whose files have arrived: what `POST /logs` stores. */
export interface NewUpload {
  fieldId: string;
  again: boolean;
  /** At least one; the same bytes twice are kept once. */
  files: readonly ReceivedFile[];
  machineId: string | null;
  mapping: LogMapping | null;
}

/** Streams a log to the object store, notes it and hands it to the worker. @throws AppError 404, 409, 413, 415, 422 */
export async function uploadLog(container: Container, scope: Scope, input: UploadInput): Promise<{ id: string }> {
  const { fieldId, again, together, request } = input;
  await withOrganisation(scope, (tx) => getFieldOrThrow(tx, scope, fieldId));
  const { organisationId } = scope;
  const { files, fields } = await receiveUpload(container, { organisationId, request, together });
  try {
    refuseUnstorable(fields);
    const mapping = parseMappingField(fields.mapping);
    refuseUnstorable({ mapping });
    const machineId = fields.machineId || null;
    const id = await keepUpload(container, scope, { fieldId, again, files, machineId, mapping });
    await sendReadLog(container, scope, id);
    return { id };
  } finally {
    await Promise.allSettled(files.map(({ key }) => container.storage.delete(key)));
  }
}

function parseMappingField(text: string | undefined): LogMapping | null {
  if (!text) return null;
  try {
    return readMapping(JSON.parse(text));
  } catch (error) {
    if (error instanceof AppError) throw error;
    const message = "the mapping is not JSON";
    throw new AppError("unprocessable", `mapping: ${message}.`, {
      places: [{ path: "mapping", message }],
      cause: error,
    });
  }
}

/** Moves the bytes to their place and writes the log's rows, all or nothing. The caller wakes the worker. */
export async function keepUpload(container: Container, scope: Scope, input: NewUpload): Promise<string> {
  const { fieldId, machineId, mapping } = input;
  const files = distinctFiles(input.files);
  const sha256 = hashOfSet(files.map((file) => file.sha256));
  const fileName = nameFiles(files.map((file) => file.fileName));
  const fileBytes = files.reduce((sum, file) => sum + file.fileBytes, 0);
  const id = newId("log");
  await withOrganisation(scope, async (tx) => {
    if (machineId) await demandMachine(tx, scope, machineId);
    // Always in the same order, so that two requests never wait for each other.
    for (const hash of files.map((file) => file.sha256).sort()) await lockBytes(tx, scope, hash);
    if (!input.again) await refuseSameBytes(tx, scope, { fieldId, sha256 });
    const arrived: typeof files = [];
    for (const file of files) {
      if (!(await isFileInUse(tx, scope, { sha256: file.sha256, exceptLogId: id }))) arrived.push(file);
    }
    const name = logName(files[0]?.fileName ?? fileName);
    await insertLog(tx, scope, { id, fieldId, machineId, mapping, name, fileName, fileBytes, sha256 });
    await insertLogFiles(tx, scope, { logId: id, files });
    await noteReadLog(tx, scope, id);
    const detail = { fieldId, fileName, fileBytes, files: files.length };
    await recordAudit(tx, scope, { action: "log.upload", subject: id, detail });
    for (const file of arrived) {
      await container.storage.copy(file.key, uploadKey({ organisationId: scope.organisationId, sha256: file.sha256 }));
    }
  });
  return id;
}

function logName(fileName: string): string {
  return fileName.replace(/\.(csv|tsv|txt|json|geojson|zip|gz)$/i, "").replace(/\.csv$/i, "") || fileName;
}

async function refuseSameBytes(
  tx: Transaction,
  scope: Scope,
  input: { fieldId: string; sha256: string },
): Promise<void> {
  const same = await findSameBytes(tx, scope, input);
  if (!same) return;
  throw new AppError(
    "conflict",
    "This field already has a log with the very same bytes. Open that one, or send again=1 to keep both.",
    { detailCode: "same_bytes", extra: { id: same.id, logId: same.id } },
  );
}
