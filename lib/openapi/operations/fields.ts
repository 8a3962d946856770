import type { Operation } from "@/lib/openapi/operation";
import { Field, FieldWithNotes, FieldInput, FieldList, FieldPatch } from "@/lib/schemas/fields";
import { Boundary } from "@/lib/schemas/geometry";
import { ForceQuery, ListQuery } from "@/lib/schemas/listing";

const tag = "Fields";

export const fieldOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/fields",
    tag,
    permission: "fields.read",
    summary: "Fields by name",
    description: "A viewer sees the fields given to them.",
    query: ListQuery,
    replies: [{ status: 200, description: "A page of fields", schema: FieldList }],
  },
  {
    method: "POST",
    path: "/api/v1/fields",
    tag,
    permission: "fields.write",
    summary: "Add a field",
    body: FieldInput,
    replies: [{ status: 201, description: "The field; its address in Location", schema: Field }],
  },
  {
    method: "GET",
    path: "/api/v1/fields/{fieldId}",
    tag,
    permission: "fields.read",
    summary: "One field",
    replies: [{ status: 200, description: "The field", schema: Field }],
  },
  {
    method: "PATCH",
    path: "/api/v1/fields/{fieldId}",
    tag,
    permission: "fields.write",
    summary: "Change a field",
    description: "What is not named stays. `boundary: null` takes the boundary away.",
    body: FieldPatch,
    replies: [{ status: 200, description: "The field as it is now", schema: Field }],
  },
  {
    method: "DELETE",
    path: "/api/v1/fields/{fieldId}",
    tag,
    permission: "fields.write",
    summary: "Delete a field",
    description: "A field that holds logs is kept (409) unless `force=1`; then its logs and shares go with it.",
    query: ForceQuery,
    replies: [{ status: 204, description: "Gone" }],
    errors: ["conflict"],
  },
  {
    method: "PUT",
    path: "/api/v1/fields/{fieldId}/boundary",
    tag,
    permission: "fields.write",
    summary: "Set the boundary",
    description:
      "As JSON (geometry, feature or collection; its polygons become one boundary), or as a file in a multipart body. " +
      "A ring that crosses itself is refused with the place of the crossing; ground that lies in two parts counts once. " +
      "Tracks and routes of a GPX that come back to within a tenth of their length are closed. `areaM2` is the area on the " +
      "WGS 84 ellipsoid; `notes` says what was done on the way.",
    body: Boundary,
    form: {
      file: { kind: "file", required: true, description: "GeoJSON, KML, GPX or zipped shapefile, at most 5 MB" },
    },
    replies: [{ status: 200, description: "The field with its new area", schema: FieldWithNotes }],
    errors: ["unsupported_file", "too_large"],
  },
];
