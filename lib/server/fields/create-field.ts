import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { insertField } from "@/db/queries/fields";
import { newId } from "@/lib/ids";
import type { Field, FieldInput } from "@/lib/schemas/fields";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";
import { checkBoundary } from "@/lib/server/fields/check-boundary";
import { readFieldIn } from "@/lib/server/fields/read-fields";

export async function createField(_container: Container, scope: Scope, input: FieldInput): Promise<Field> {
  const area = input.boundary ? checkBoundary(input.boundary) : { boundary: null, areaM2: null };
  const id = newId("field");
  return withOrganisation(scope, async (tx) => {
    const { name, farm = null, landowner = null } = input;
    await insertField(tx, scope, { id, name, farm, landowner, ...area });
    await recordAudit(tx, scope, { action: "field.create", subject: id, detail: { name } });
    return readFieldIn(tx, scope, id);
  });
}
