import { parseBody, parseQuery } from "@/app/_server/parse-body";
import { reply, replyNothing } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Field, FieldPatch } from "@/lib/schemas/fields";
import { ForceQuery } from "@/lib/schemas/listing";
import { deleteField } from "@/lib/server/fields/delete-field";
import { readField } from "@/lib/server/fields/read-fields";
import { updateField } from "@/lib/server/fields/update-field";

export const GET = withScope<"fieldId">("fields.read", async ({ container, scope, params }) =>
  reply(Field, await readField(container, scope, params.fieldId)),
);

export const PATCH = withScope<"fieldId">("fields.write", async ({ container, scope, params, request }) => {
  const patch = await parseBody(FieldPatch, request);
  return reply(Field, await updateField(container, scope, { fieldId: params.fieldId, patch }));
});

export const DELETE = withScope<"fieldId">("fields.write", async ({ container, scope, params, url }) => {
  await deleteField(container, scope, { fieldId: params.fieldId, ...parseQuery(ForceQuery, url) });
  return replyNothing();
});

export { refuseMethod as POST, refuseMethod as PUT } from "@/app/_server/refuse-method";
