import { parseBody, parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Field, FieldInput, FieldList } from "@/lib/schemas/fields";
import { ListQuery } from "@/lib/schemas/listing";
import { createField } from "@/lib/server/fields/create-field";
import { listFields } from "@/lib/server/fields/read-fields";

export const GET = withScope("fields.read", async ({ container, scope, url }) =>
  reply(FieldList, await listFields(container, scope, parseQuery(ListQuery, url))),
);

export const POST = withScope("fields.write", async ({ container, scope, request }) => {
  const field = await createField(container, scope, await parseBody(FieldInput, request));
  return reply(Field, field, { status: 201, headers: { location: `/api/v1/fields/${field.id}` } });
});

export { refuseMethod as PUT, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
