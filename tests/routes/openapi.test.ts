import { readFileSync } from "node:fs";
import path from "node:path";
import ts from "typescript";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { replaceContainer } from "@/app/_server/container";
import { OPERATIONS } from "@/lib/openapi";
import { callApi, listRouteFolders } from "@/tests/support/call-api";
import { makeContainer } from "@/tests/support/make-container";

const METHODS = ["GET", "POST", "PUT", "PATCH", "DELETE"];

/** `api/v1/logs/[logId]` as `/api/v1/logs/{logId}`; the last part of a tile's address carries its ending. */
function toTemplate(folder: string): string {
  return `/${folder.replaceAll(/\[(\w+)\]/g, "{$1}").replace(/\{y\}$/, "{y}.png")}`;
}

interface ExportedMethod {
  method: string;
  isRefused: boolean;
  permission: string | null;
}

function wrapperOf(file: ts.SourceFile, name: string): string | null {
  let found: string | null = null;
  file.forEachChild(function visit(node) {
    const isIt = ts.isVariableDeclaration(node) && node.name.getText(file) === name && node.initializer;
    if (isIt && ts.isCallExpression(node.initializer!)) {
      const [first] = node.initializer.arguments;
      const wrapper = node.initializer.expression.getText(file);
      if (wrapper === "withPublic") found = "public";
      if (wrapper === "withScope" && first && ts.isStringLiteral(first)) found = first.text;
    }
    node.forEachChild(visit);
  });
  return found;
}

/** What a route file exports, and the permission its wrapper names. */
function readExports(folder: string): ExportedMethod[] {
  const name = path.join("app", folder, "route.ts");
  const file = ts.createSourceFile(name, readFileSync(name, "utf8"), ts.ScriptTarget.Latest, true);
  const found: ExportedMethod[] = [];
  for (const statement of file.statements) {
    if (ts.isVariableStatement(statement)) {
      for (const declaration of statement.declarationList.declarations) {
        const method = declaration.name.getText(file);
        if (METHODS.includes(method)) found.push({ method, isRefused: false, permission: wrapperOf(file, method) });
      }
    }
    if (ts.isExportDeclaration(statement) && statement.exportClause && ts.isNamedExports(statement.exportClause)) {
      for (const { name: method, propertyName } of statement.exportClause.elements) {
        const local = (propertyName ?? method).text;
        const permission = wrapperOf(file, local);
        found.push({ method: method.text, isRefused: local === "refuseMethod", permission });
      }
    }
  }
  return found;
}

const routes = listRouteFolders()
  .filter((folder) => folder.startsWith("api/v1/") && !folder.includes("[..."))
  .map((folder) => ({ folder, path: toTemplate(folder), methods: readExports(folder) }));

describe("the list of operations", () => {
  it("names every route there is, and no other, with the permission the route asks for", () => {
    const inFiles = routes
      .flatMap((route) =>
        route.methods
          .filter((exported) => !exported.isRefused)
          .map(({ method, permission }) => `${method} ${route.path} ${permission}`),
      )
      .sort();
    const inList = OPERATIONS.map(({ method, path: at, permission }) => `${method} ${at} ${permission}`).sort();
    expect(inList).toEqual(inFiles);
  });

  it("leaves no method of a route without an answer", () => {
    const silent = routes.flatMap((route) => {
      const answered = route.methods.map((exported) => exported.method);
      return METHODS.filter((method) => !answered.includes(method)).map((method) => `${method} ${route.path}`);
    });
    expect(silent).toEqual([]);
  });
});

describe("GET /api/v1/openapi.json", () => {
  let document: { openapi: string; paths: Record<string, Record<string, Record<string, unknown>>> };
  beforeAll(async () => {
    process.env.DATABASE_URL ??= "postgres://nobody@127.0.0.1:1/none";
    process.env.DATABASE_ADMIN_URL ??= "postgres://nobody@127.0.0.1:1/none";
    replaceContainer(makeContainer());
    const response = await callApi({ path: "/api/v1/openapi.json" });
    expect(response.status).toBe(200);
    document = (await response.json()) as typeof document;
  });
  afterAll(() => replaceContainer(undefined));

  it("is OpenAPI 3.1 with every operation, told apart by its id", () => {
    expect(document.openapi).toBe("3.1.0");
    const operations = Object.values(document.paths).flatMap((path) => Object.values(path));
    expect(operations).toHaveLength(OPERATIONS.length);
    expect(new Set(operations.map((operation) => operation.operationId)).size).toBe(OPERATIONS.length);
  });

  it("describes each parameter of an address, and only those", () => {
    for (const [template, methods] of Object.entries(document.paths)) {
      const wanted = [...template.matchAll(/\{(\w+)\}/g)].map((match) => match[1]);
      for (const operation of Object.values(methods)) {
        const parameters = operation.parameters as { in: string; name: string }[];
        const named = parameters.filter((parameter) => parameter.in === "path").map((parameter) => parameter.name);
        expect(named).toEqual(wanted);
      }
    }
  });

  it("carries the rules of the schemas, not a copy of them", () => {
    const body = document.paths["/api/v1/machines"]?.post?.requestBody as {
      content: Record<string, { schema: { oneOf?: unknown[]; anyOf?: unknown[] } }>;
    };
    const kinds = body.content["application/json"]?.schema;
    expect((kinds?.oneOf ?? kinds?.anyOf)?.length).toBe(2);
  });

  it("says of every operation that it answers something", () => {
    for (const methods of Object.values(document.paths)) {
      for (const operation of Object.values(methods)) {
        expect(Object.keys(operation.responses as object).length).toBeGreaterThan(0);
      }
    }
  });
});
