import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { updateField as updateFieldRow, type FieldValues } from "@/db/queries/fields";
import type { Field, FieldPatch } from "@/lib/schemas/fields";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";
import { checkBoundary } from "@/lib/server/fields/check-boundary";
import { describeField } from "@/lib/server/fields/describe-field";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";

function toChanges({ boundary, ...words }: FieldPatch): Partial<FieldValues> {
  if (boundary === undefined) return words;
  return boundary === null ? { ...words, boundary: null, areaM2: null } : { ...words, ...checkBoundary(boundary) };
}

/** Changes what is named and leaves the rest; `boundary: null` takes the boundary away. */
export async function updateField(
  container: Container,
  scope: Scope,
  input: { fieldId: string; patch: FieldPatch },
): Promise<Field> {
  const changes = toChanges(input.patch);
  return withOrganisation(scope, async (tx) => {
    const { id } = await getFieldOrThrow(tx, scope, input.fieldId);
    await updateFieldRow(tx, scope, { fieldId: id, changes, at: container.clock.now() });
    await recordAudit(tx, scope, {
      action: "field.update",
      subject: id,
      detail: { changed: Object.keys(input.patch) },
    });
    return describeField(await getFieldOrThrow(tx, scope, id));
  });
}
