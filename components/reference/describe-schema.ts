import type { JsonSchema } from "@/components/reference/read-document";

export interface SchemaLine {
  /** Dotted path within the body, such as `counts.records` or `items[].name`. */
  path: string;
  type: string;
  required: boolean;
  description: string;
}

function asSchema(value: unknown): JsonSchema | null {
  return typeof value === "object" && value !== null && !Array.isArray(value) ? (value as JsonSchema) : null;
}

function asList(value: unknown): JsonSchema[] {
  const entries: unknown[] = Array.isArray(value) ? value : [];
  return entries.map(asSchema).filter((entry) => entry !== null);
}

/** "number or null", "list of text", "one of: a, b". */
export function typeWords(schema: JsonSchema): string {
  const options = [...asList(schema.anyOf), ...asList(schema.oneOf)];
  if (options.length > 0) return [...new Set(options.map(typeWords))].join(" or ");
  if (Array.isArray(schema.enum)) return `one of: ${schema.enum.map(String).join(", ")}`;
  if (schema.const !== undefined) return JSON.stringify(schema.const);
  if (schema.type === "array") return `list of ${typeWords(asSchema(schema.items) ?? {})}`;
  if (schema.type === "string") return typeof schema.format === "string" ? `text (${schema.format})` : "text";
  if (schema.type === "integer") return "whole number";
  if (schema.type === "boolean") return "true or false";
  return typeof schema.type === "string" ? schema.type : "anything";
}

/** Deep enough to be useful, shallow enough to be read; deeper parts are in the document itself. */
const DEEPEST = 3;

/** One line a property, nested ones by their path. */
export function schemaLines(schema: JsonSchema, prefix = "", depth = 0): SchemaLine[] {
  const inner = schema.type === "array" ? asSchema(schema.items) : null;
  if (inner) return schemaLines(inner, prefix === "" ? "[]" : `${prefix}[]`, depth);
  const options = [...asList(schema.oneOf), ...asList(schema.anyOf)].filter((option) => asSchema(option.properties));
  if (options.length > 0) return uniqueLines(options.flatMap((option) => schemaLines(option, prefix, depth)));
  const properties = asSchema(schema.properties);
  if (!properties) return [];
  const required = Array.isArray(schema.required) ? schema.required : [];
  return Object.entries(properties).flatMap(([name, value]) => {
    const property = asSchema(value) ?? {};
    const path = prefix === "" ? name : `${prefix}.${name}`;
    const line = {
      path,
      type: typeWords(property),
      required: required.includes(name),
      description: typeof property.description === "string" ? property.description : "",
    };
    return [line, ...(depth + 1 < DEEPEST ? schemaLines(property, path, depth + 1) : [])];
  });
}

function uniqueLines(lines: SchemaLine[]): SchemaLine[] {
  return [...new Map(lines.map((line) => [line.path, line])).values()];
}
