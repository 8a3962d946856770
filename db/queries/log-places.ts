import { and, eq, inArray, isNotNull, isNull } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { visibleField } from "@/db/queries/visibility";
import { fields, logs, shares } from "@/db/schema";
import type { Boundary } from "@/lib/schemas/geometry";
import type { Scope } from "@/lib/scope";

export interface FieldPlace {
  id: string;
  name: string;
  boundary: Boundary;
}

/** Every field of the organisation that has a boundary. */
export async function listFieldPlaces(tx: Transaction, scope: Pick<Scope, "organisationId">): Promise<FieldPlace[]> {
  const rows = await tx
    .select({ id: fields.id, name: fields.name, boundary: fields.boundary })
    .from(fields)
    .where(and(eq(fields.organisationId, scope.organisationId), isNotNull(fields.boundary)));
  return rows.flatMap(({ boundary, ...field }) => (boundary ? [{ ...field, boundary }] : []));
}

/** Names of those of the fields that the caller may see, by id. */
export async function nameFields(tx: Transaction, scope: Scope, fieldIds: string[]): Promise<Map<string, string>> {
  if (fieldIds.length === 0) return new Map();
  const rows = await tx
    .select({ id: fields.id, name: fields.name })
    .from(fields)
    .where(
      and(
        eq(fields.organisationId, scope.organisationId),
        inArray(fields.id, fieldIds),
        visibleField(scope, fields.id),
      ),
    );
  return new Map(rows.map((row) => [row.id, row.name]));
}

/** Puts a log into another field of the organisation. */
export async function moveLogRow(
  tx: Transaction,
  scope: Scope,
  { logId, fieldId }: { logId: string; fieldId: string },
): Promise<void> {
  await tx
    .update(logs)
    .set({ fieldId, updatedAt: new Date() })
    .where(and(eq(logs.organisationId, scope.organisationId), eq(logs.id, logId)));
}

/** Whether a link that has not been ended shows this very log. */
export async function isLogShared(tx: Transaction, scope: Scope, logId: string): Promise<boolean> {
  const rows = await tx
    .select({ id: shares.id })
    .from(shares)
    .where(and(eq(shares.organisationId, scope.organisationId), eq(shares.logId, logId), isNull(shares.revokedAt)))
    .limit(1);
  return rows.length > 0;
}
