import { z } from "zod";
import { ERROR_CODES, type ErrorCode } from "@/lib/errors";
import type { FormPart, Operation, OperationReply } from "@/lib/openapi/operation";

type Json = Record<string, unknown>;

/** JSON Schema of a request (`input`) or a reply (`output`); the document names the dialect once for all. */
function toSchema(schema: z.ZodType, io: "input" | "output"): Json {
  const whole: Json = { ...z.toJSONSchema(schema, { io, unrepresentable: "any", target: "draft-2020-12" }) };
  delete whole.$schema;
  return whole;
}

function describePathParameters(path: string): Json[] {
  return [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => ({
    name,
    in: "path",
    required: true,
    schema: { type: "string" },
  }));
}

function describeQuery(query: z.ZodObject | undefined): Json[] {
  if (!query) return [];
  const { properties = {}, required = [] } = toSchema(query, "input") as { properties?: Json; required?: string[] };
  return Object.entries(properties).map(([name, schema]) => ({
    name,
    in: "query",
    required: required.includes(name),
    schema,
  }));
}

function describeFormPart({ kind, description }: FormPart): Json {
  if (kind === "file") return { type: "string", format: "binary", description };
  return { type: "string", description, ...(kind === "json" ? { contentMediaType: "application/json" } : {}) };
}

function describeForm(form: Record<string, FormPart>): Json {
  const parts = Object.entries(form);
  return {
    schema: {
      type: "object",
      properties: Object.fromEntries(parts.map(([name, part]) => [name, describeFormPart(part)])),
      required: parts.filter(([, part]) => part.required).map(([name]) => name),
    },
  };
}

function describeBody({ body, form }: Operation): Json {
  if (!body && !form) return {};
  return {
    requestBody: {
      required: true,
      content: {
        ...(body ? { "application/json": { schema: toSchema(body, "input") } } : {}),
        ...(form ? { "multipart/form-data": describeForm(form) } : {}),
      },
    },
  };
}

function describeReply({ description, schema, contentType = "application/json" }: OperationReply): Json {
  if (!schema && contentType === "application/json") return { description };
  return { description, content: { [contentType]: schema ? { schema: toSchema(schema, "output") } : {} } };
}

function errorsOf(operation: Operation): ErrorCode[] {
  const errors = new Set<ErrorCode>(operation.errors ?? []);
  if (operation.permission !== "public") errors.add("unauthorized").add("forbidden");
  if (operation.path.includes("{")) errors.add("not_found");
  if (operation.body || operation.query || operation.form) errors.add("unprocessable");
  if (operation.body) errors.add("bad_request");
  return [...errors];
}

function describeError(code: ErrorCode): [string, Json] {
  const { status, title } = ERROR_CODES[code];
  return [
    String(status),
    {
      description: title,
      content: { "application/problem+json": { schema: { $ref: "#/components/schemas/Problem" } } },
    },
  ];
}

function describeIdempotency({ method, permission }: Operation): Json[] {
  if (method !== "POST" || permission === "public") return [];
  const description = "A repeated POST with the same key makes one thing and gets the first reply.";
  return [{ name: "Idempotency-Key", in: "header", required: false, description, schema: { type: "string" } }];
}

/** One operation as OpenAPI 3.1 describes it. */
export function describeOperation(operation: Operation): Json {
  const { tag, summary, description, permission, method, path } = operation;
  const replies = operation.replies.map((reply): [string, Json] => [String(reply.status), describeReply(reply)]);
  return {
    tags: [tag],
    summary,
    ...(description ? { description } : {}),
    operationId: `${method.toLowerCase()}${path.replace("/api/v1", "").replaceAll(/[^a-zA-Z]+(\w?)/g, (_, letter: string) => letter.toUpperCase())}`,
    security: permission === "public" ? [] : [{ session: [] }, { token: [] }],
    "x-permission": permission,
    parameters: [...describePathParameters(path), ...describeQuery(operation.query), ...describeIdempotency(operation)],
    ...describeBody(operation),
    responses: Object.fromEntries([...errorsOf(operation).map(describeError), ...replies]),
  };
}
