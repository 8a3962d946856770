import { readBoundaryRequest } from "@/app/_server/read-boundary-request";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { FieldWithNotes } from "@/lib/schemas/fields";
import { noteOverlap } from "@/lib/server/fields/check-boundary";
import { readField } from "@/lib/server/fields/read-fields";
import { updateField } from "@/lib/server/fields/update-field";

export const PUT = withScope<"fieldId">("fields.write", async ({ container, scope, params, request }) => {
  // Before its file is read: nobody's field is no place to send megabytes to.
  await readField(container, scope, params.fieldId);
  const { boundary, notes } = await readBoundaryRequest(request);
  const field = await updateField(container, scope, { fieldId: params.fieldId, patch: { boundary } });
  return reply(FieldWithNotes, { ...field, notes: [...notes, ...noteOverlap(boundary)] });
});

export {
  refuseMethod as GET,
  refuseMethod as POST,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
