import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { deleteFieldRow, listLogIdsOfField } from "@/db/queries/fields";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";
import { deleteLog } from "@/lib/server/logs/delete-log";

/**
 * Deletes a field with its shares and grants. A field that holds logs is kept (409) unless `force`: then its logs go
 * first, one by one, so that a failure half-way leaves a field with fewer logs and never logs without a field.
 */
export async function deleteField(
  container: Container,
  scope: Scope,
  input: { fieldId: string; force: boolean },
): Promise<void> {
  const { fieldId, force } = input;
  const logIds = await withOrganisation(scope, async (tx) => {
    await getFieldOrThrow(tx, scope, fieldId);
    return listLogIdsOfField(tx, scope, fieldId);
  });
  if (logIds.length > 0 && !force) {
    throw new AppError(
      "conflict",
      `The field holds ${logIds.length} logs. Delete them first, or repeat with force=1.`,
      {
        detailCode: "field_has_logs",
        extra: { logCount: logIds.length },
      },
    );
  }
  for (const logId of logIds) await deleteLog(container, scope, logId);
  await withOrganisation(scope, async (tx) => {
    const { name } = await getFieldOrThrow(tx, scope, fieldId);
    await deleteFieldRow(tx, scope, fieldId);
    await recordAudit(tx, scope, { action: "field.delete", subject: fieldId, detail: { name, logs: logIds.length } });
  });
}
