import "server-only";
import type { Transaction } from "@/db/client";
import { getField, type FieldRow } from "@/db/queries/fields";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";

/** @throws AppError `not_found` for an absent field, another organisation's, and one not given to a viewer */
export async function getFieldOrThrow(tx: Transaction, scope: Scope, fieldId: string): Promise<FieldRow> {
  const row = await getField(tx, scope, fieldId);
  if (!row) throw new AppError("not_found", "There is no such field.");
  return row;
}
