import { describe, expect, it } from "vitest";
import { schemaLines, typeWords } from "@/components/reference/describe-schema";
import { readDocument } from "@/components/reference/read-document";
import { buildOpenApiDocument } from "@/lib/openapi/build-document";

describe("the reference page", () => {
  it("shows every operation of the published document", () => {
    const document = buildOpenApiDocument("http://127.0.0.1");
    const { sections } = readDocument(document);
    const shown = sections.flatMap((section) => section.operations.map(({ method, path }) => `${method} ${path}`));
    const published = Object.entries(document["paths"] as Record<string, object>).flatMap(([path, methods]) =>
      Object.keys(methods).map((method) => `${method.toUpperCase()} ${path}`),
    );
    expect(shown.sort()).toEqual(published.sort());
  });

  it("says types in words and nested names by their path", () => {
    expect(typeWords({ anyOf: [{ type: "number" }, { type: "null" }] })).toBe("number or null");
    const schema = {
      type: "object",
      required: ["items"],
      properties: { items: { type: "array", items: { type: "object", properties: { areaM2: { type: "number" } } } } },
    };
    expect(schemaLines(schema).map(({ path, required }) => [path, required])).toEqual([
      ["items", true],
      ["items[].areaM2", false],
    ]);
  });
});
