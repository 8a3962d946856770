import "server-only";
import { withOrganisation } from "@/db/client";
import { getLogOrThrow, listLogsOfField } from "@/db/queries/logs";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Log } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";
import { describeLog } from "@/lib/server/logs/describe-log";
import { describeLogFiles } from "@/lib/server/logs/describe-log-files";
import { nameHoldingFields } from "@/lib/server/logs/note-place";

/** @throws AppError `not_found` */
export async function getLog(_container: Container, scope: Scope, logId: string): Promise<Log> {
  return withOrganisation(scope, async (tx) => {
    const row = await getLogOrThrow(tx, scope, logId);
    const log = describeLog(row, scope);
    const [named = log] = await nameHoldingFields(tx, scope, [log]);
    return { ...named, files: await describeLogFiles(tx, scope, row) };
  });
}

/** Logs of a field, the newest first. @throws AppError `not_found` for a field that the caller may not see */
export async function listLogs(
  _container: Container,
  scope: Scope,
  input: { fieldId: string; query: ListQuery },
): Promise<{ items: Log[]; nextCursor: string | null }> {
  return withOrganisation(scope, async (tx) => {
    await getFieldOrThrow(tx, scope, input.fieldId);
    const { rows, nextCursor } = await listLogsOfField(tx, scope, input);
    return {
      items: await nameHoldingFields(
        tx,
        scope,
        rows.map((row) => describeLog(row, scope)),
      ),
      nextCursor,
    };
  });
}
