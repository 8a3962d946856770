import { readBoundaryRequest } from "@/app/_server/read-boundary-request";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Field } from "@/lib/schemas/fields";
import { updateField } from "@/lib/server/fields/update-field";

export const PUT = withScope<"fieldId">("fields.write", async ({ container, scope, params, request }) => {
  const boundary = await readBoundaryRequest(request);
  return reply(Field, await updateField(container, scope, { fieldId: params.fieldId, patch: { boundary } }));
});

export {
  refuseMethod as GET,
  refuseMethod as POST,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
