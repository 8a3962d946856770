import { z } from "zod";

/** The parts of an OpenAPI 3.1 document that the reference page shows. */
const JsonSchema = z.looseObject({
  type: z.union([z.string(), z.array(z.string())]).optional(),
  description: z.string().optional(),
});
export type JsonSchema = Record<string, unknown>;

const Content = z.record(z.string(), z.object({ schema: JsonSchema.optional() }));
const ParameterBody = z.object({
  name: z.string(),
  in: z.string(),
  required: z.boolean().optional(),
  description: z.string().optional(),
  schema: JsonSchema.optional(),
});
const OperationBody = z.object({
  tags: z.array(z.string()).default([]),
  summary: z.string().default(""),
  description: z.string().optional(),
  operationId: z.string(),
  "x-permission": z.string().optional(),
  parameters: z.array(ParameterBody).default([]),
  requestBody: z.object({ content: Content }).optional(),
  responses: z.record(z.string(), z.object({ description: z.string(), content: Content.optional() })),
});
export type OperationBody = z.infer<typeof OperationBody>;

const DocumentBody = z.object({
  info: z.object({ title: z.string(), version: z.string(), description: z.string().optional() }),
  paths: z.record(z.string(), z.record(z.string(), OperationBody)),
});

export interface ReferenceOperation extends OperationBody {
  path: string;
  method: string;
}

export interface ReferenceSection {
  tag: string;
  operations: ReferenceOperation[];
}

/** An OpenAPI document as sections of operations. @throws ZodError when it is no such document */
export function readDocument(document: unknown): { description: string; sections: ReferenceSection[] } {
  const { info, paths } = DocumentBody.parse(document);
  const sections = new Map<string, ReferenceOperation[]>();
  for (const [path, methods] of Object.entries(paths)) {
    for (const [method, operation] of Object.entries(methods)) {
      const tag = operation.tags[0] ?? "Other";
      sections.set(tag, [...(sections.get(tag) ?? []), { ...operation, path, method: method.toUpperCase() }]);
    }
  }
  return {
    description: info.description ?? "",
    sections: [...sections].map(([tag, operations]) => ({ tag, operations })),
  };
}
