import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { findSameBytes, insertLog, isFileInUse, lockBytes } from "@/db/queries/logs";
import { AppError } from "@/lib/errors";
import { newId } from "@/lib/ids";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";
import { demandMachine } from "@/lib/server/logs/change-log";
import { uploadKey } from "@/lib/server/logs/log-file";
import { readMapping } from "@/lib/server/logs/map-columns";
import { noteReadLog, sendReadLog } from "@/lib/server/logs/queue-log";
import { receiveUpload, type ReceivedUpload } from "@/lib/server/logs/receive-upload";

interface UploadInput {
  fieldId: string;
  /** Take bytes that the field has already. */
  again: boolean;
  request: Request;
}

/** A file whose parts have been read: what `POST /logs` stores. */
export interface NewUpload {
  fieldId: string;
  again: boolean;
  upload: Pick<ReceivedUpload, "key" | "fileName" | "fileBytes" | "sha256">;
  machineId: string | null;
  mapping: LogMapping | null;
}

/** Streams a log to the object store, notes it and hands it to the worker. @throws AppError 404, 409, 413, 415, 422 */
export async function uploadLog(container: Container, scope: Scope, input: UploadInput): Promise<{ id: string }> {
  await withOrganisation(scope, (tx) => getFieldOrThrow(tx, scope, input.fieldId));
  const upload = await receiveUpload(container, scope.organisationId, input.request);
  try {
    const mapping = parseMappingField(upload.fields.mapping);
    const machineId = upload.fields.machineId || null;
    const id = await keepUpload(container, scope, { ...input, upload, machineId, mapping });
    await sendReadLog(container, scope, id);
    return { id };
  } finally {
    await container.storage.delete(upload.key).catch(() => undefined);
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

/** Moves the bytes to their place and writes the log's row, both or neither. The caller wakes the worker. */
export async function keepUpload(container: Container, scope: Scope, input: NewUpload): Promise<string> {
  const { fieldId, upload, machineId, mapping } = input;
  const { sha256, fileName, fileBytes } = upload;
  const id = newId("log");
  const key = uploadKey({ organisationId: scope.organisationId, sha256 });
  await withOrganisation(scope, async (tx) => {
    if (machineId) await demandMachine(tx, scope, machineId);
    await lockBytes(tx, scope, sha256);
    if (!input.again) await refuseSameBytes(tx, scope, { fieldId, sha256 });
    const isKept = await isFileInUse(tx, scope, { sha256, exceptLogId: id });
    const name = fileName.replace(/\.(csv|tsv|txt|json|geojson|zip|gz)$/i, "").replace(/\.csv$/i, "") || fileName;
    await insertLog(tx, scope, { id, fieldId, machineId, mapping, name, fileName, fileBytes, sha256 });
    await noteReadLog(tx, scope, id);
    await recordAudit(tx, scope, { action: "log.upload", subject: id, detail: { fieldId, fileName, fileBytes } });
    if (!isKept) await container.storage.copy(upload.key, key);
  });
  return id;
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
