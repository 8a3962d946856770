import "server-only";
import { withOrganisation } from "@/db/client";
import { listFields as listFieldRows } from "@/db/queries/fields";
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
  const { rows, nextCursor } = await withOrganisation(scope, (tx) => listFieldRows(tx, scope, query));
  return { items: rows.map(describeField), nextCursor };
}

export async function readField(_container: Container, scope: Scope, fieldId: string): Promise<Field> {
  return describeField(await withOrganisation(scope, (tx) => getFieldOrThrow(tx, scope, fieldId)));
}
