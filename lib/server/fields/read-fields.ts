import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { listFields as listFieldRows } from "@/db/queries/fields";
import { listNewestLogs } from "@/db/queries/newest-logs";
import type { Field } from "@/lib/schemas/fields";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";
import { describeField } from "@/lib/server/fields/describe-field";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";

export async function listFields(
  _container: Container,
  scope: Scope,
  query: ListQuery,
): Promise<{ items: Field[]; nextCursor: string | null }> {
  return withOrganisation(scope, async (tx) => {
    const { rows, nextCursor } = await listFieldRows(tx, scope, query);
    const newest = await listNewestLogs(
      tx,
      scope,
      rows.map((row) => row.id),
    );
    const byField = new Map(newest.map((log) => [log.fieldId, log]));
    return { items: rows.map((row) => describeField(row, byField.get(row.id))), nextCursor };
  });
}

/** One field inside a transaction that is under way. @throws AppError `not_found` */
export async function readFieldIn(tx: Transaction, scope: Scope, fieldId: string): Promise<Field> {
  const row = await getFieldOrThrow(tx, scope, fieldId);
  const [newest] = await listNewestLogs(tx, scope, [fieldId]);
  return describeField(row, newest);
}

export async function readField(_container: Container, scope: Scope, fieldId: string): Promise<Field> {
  return withOrganisation(scope, (tx) => readFieldIn(tx, scope, fieldId));
}
