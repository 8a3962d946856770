import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { updateField as updateFieldRow, type FieldRow, type FieldValues } from "@/db/queries/fields";
import { describeChanges, type Changes } from "@/lib/audit/describe-changes";
import type { Field, FieldPatch } from "@/lib/schemas/fields";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";
import { checkBoundary } from "@/lib/server/fields/check-boundary";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";
import { readFieldIn } from "@/lib/server/fields/read-fields";

function toChanges({ boundary, ...words }: FieldPatch): Partial<FieldValues> {
  if (boundary === undefined) return words;
  return boundary === null ? { ...words, boundary: null, areaM2: null } : { ...words, ...checkBoundary(boundary) };
}

/** A boundary is told by its area: its corners would fill the record, and the old ones are nobody's need. */
function describeFieldChanges(known: FieldRow, { boundary, ...words }: Partial<FieldValues>): Changes {
  const changes = describeChanges(known, words);
  const isOther = boundary !== undefined && JSON.stringify(boundary) !== JSON.stringify(known.boundary);
  return isOther ? { ...changes, changed: [...changes.changed, "boundary"] } : changes;
}

/** Changes what is named and leaves the rest; `boundary: null` takes the boundary away. */
export async function updateField(
  container: Container,
  scope: Scope,
  input: { fieldId: string; patch: FieldPatch },
): Promise<Field> {
  const changes = toChanges(input.patch);
  return withOrganisation(scope, async (tx) => {
    const known = await getFieldOrThrow(tx, scope, input.fieldId);
    const { id } = known;
    await updateFieldRow(tx, scope, { fieldId: id, changes, at: container.clock.now() });
    await recordAudit(tx, scope, {
      action: "field.update",
      subject: id,
      detail: { name: known.name, ...describeFieldChanges(known, changes) },
    });
    return readFieldIn(tx, scope, id);
  });
}
