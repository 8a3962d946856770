import { existsSync, readFileSync } from "node:fs";
import { execFileSync } from "node:child_process";
import path from "node:path";
import ts from "typescript";
import { describe, expect, it } from "vitest";

interface SourceFile {
  name: string;
  text: string;
  ast: ts.SourceFile;
}

function listFiles(): string[] {
  const listed = execFileSync("git", ["ls-files", "--cached", "--others", "--exclude-standard"], { encoding: "utf8" });
  return listed.split("\n").filter((name) => /\.tsx?$/.test(name) && !name.endsWith(".d.ts") && existsSync(name));
}

const files: SourceFile[] = listFiles().map((name) => {
  const text = readFileSync(name, "utf8");
  return { name, text, ast: ts.createSourceFile(name, text, ts.ScriptTarget.Latest, true) };
});

function importsOf({ ast }: SourceFile): { target: string; isTypeOnly: boolean }[] {
  const found: { target: string; isTypeOnly: boolean }[] = [];
  ast.forEachChild(function visit(node) {
    if (ts.isImportDeclaration(node) && ts.isStringLiteral(node.moduleSpecifier)) {
      const clause = node.importClause;
      const named = clause?.namedBindings;
      const onlyTypes = Boolean(
        named && ts.isNamedImports(named) && !clause?.name && named.elements.every((element) => element.isTypeOnly),
      );
      found.push({ target: node.moduleSpecifier.text, isTypeOnly: clause?.isTypeOnly === true || onlyTypes });
    }
    if (ts.isExportDeclaration(node) && node.moduleSpecifier && ts.isStringLiteral(node.moduleSpecifier)) {
      found.push({ target: node.moduleSpecifier.text, isTypeOnly: node.isTypeOnly });
    }
    if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      const [argument] = node.arguments;
      if (argument && ts.isStringLiteral(argument)) found.push({ target: argument.text, isTypeOnly: false });
    }
    node.forEachChild(visit);
  });
  return found;
}

/** An import as the path it means: `@/db/client` and `../db/client` are the same thing. */
function resolveTarget(from: string, target: string): string {
  if (target.startsWith(".")) return path.posix.join(path.posix.dirname(from), target);
  return target.startsWith("@/") ? target.slice(2) : target;
}

const isUnder = (folder: string) => (file: SourceFile) => file.name.startsWith(`${folder}/`);
const isServerLib = isUnder("lib/server");
const isPureLib = (file: SourceFile) => isUnder("lib")(file) && !isServerLib(file);

/** Imports of these files that break the rule, as `file -> import`. */
function breaches(of: SourceFile[], forbidden: RegExp, options: { evenTypes: boolean }): string[] {
  return of.flatMap((file) =>
    importsOf(file)
      .filter(({ isTypeOnly }) => options.evenTypes || !isTypeOnly)
      .map(({ target }) => resolveTarget(file.name, target))
      .filter((target) => forbidden.test(target))
      .map((target) => `${file.name} -> ${target}`),
  );
}

describe("who may import what", () => {
  it("keeps the core of lib/ free of frameworks, the database and the outside world", () => {
    const forbidden =
      /^(next|react|react-dom|drizzle-orm|pg|node:.*|fs|path|crypto)(\/|$)|^(db|app|components|lib\/server)\//;
    expect(breaches(files.filter(isPureLib), forbidden, { evenTypes: true })).toEqual([]);
  });

  it("keeps next and react out of lib/server/", () => {
    const forbidden = /^(next|react|react-dom)(\/|$)|^(app|components)\//;
    expect(breaches(files.filter(isServerLib), forbidden, { evenTypes: true })).toEqual([]);
  });

  it("keeps the database to queries, services and app/_server", () => {
    const pages = files.filter((file) => isUnder("app")(file) && !isUnder("app/_server")(file));
    expect(breaches(pages, /^db\//, { evenTypes: true })).toEqual([]);
    expect(breaches(files.filter(isUnder("components")), /^(db|lib\/server|app)\//, { evenTypes: true })).toEqual([]);
    const data = files.filter((file) => isUnder("db")(file) && !isUnder("db/seed")(file));
    expect(breaches(data, /^(next|react)(\/|$)|^(app|components|lib\/server)\//, { evenTypes: true })).toEqual([]);
  });

  it("opens the database past row-level security in db/queries/system only", () => {
    const users = files
      .filter((file) => !file.name.startsWith("tests/") && /\badminDb\b/.test(file.text))
      .map((file) => file.name)
      .filter((name) => name !== "db/client.ts" && !name.startsWith("db/queries/system/"));
    expect(users).toEqual([]);
  });

  it("builds SDK clients in adapters, fakes, the worker and scripts only", () => {
    const rest = files.filter((file) => !/^(lib\/server\/(adapters|fakes|worker)|scripts|tests)\//.test(file.name));
    expect(breaches(rest, /^(@aws-sdk\/|nodemailer|pg-boss|smtp-server|s3rver)/, { evenTypes: false })).toEqual([]);
  });

  it("marks what must not reach a browser, and nothing else, as server-only", () => {
    const marked = files.filter((file) => importsOf(file).some(({ target }) => target === "server-only"));
    const outside = marked.map((file) => file.name).filter((name) => !/^(app\/_server|lib\/server)\//.test(name));
    expect(outside).toEqual([]);
    const glue = files.filter(isUnder("app/_server")).filter((file) => !marked.includes(file));
    expect(glue.map((file) => file.name)).toEqual([]);
  });

  it("imports by alias, not by climbing", () => {
    const climbing = files.flatMap((file) =>
      importsOf(file)
        .filter(({ target }) => target.startsWith("../"))
        .map(({ target }) => `${file.name} -> ${target}`),
    );
    expect(climbing).toEqual([]);
  });
});

/** The outermost call of an expression: `withScope(...)` of `export const GET = withScope(...)`. */
function wrapperOf(ast: ts.SourceFile, name: string, depth = 0): string | null {
  for (const statement of ast.statements) {
    if (ts.isFunctionDeclaration(statement) && statement.name?.text === name) return `function ${name}`;
    if (!ts.isVariableStatement(statement)) continue;
    for (const { name: declared, initializer } of statement.declarationList.declarations) {
      if (declared.getText(ast) !== name || !initializer) continue;
      if (ts.isCallExpression(initializer)) return initializer.expression.getText(ast);
      if (ts.isIdentifier(initializer) && depth < 3) return wrapperOf(ast, initializer.text, depth + 1);
    }
  }
  return null;
}

/** Every exported name of a file with what wraps it. */
function exportsOf({ ast }: SourceFile): { name: string; wrapper: string | null }[] {
  return ast.statements.flatMap((statement) => {
    const isExported = ts.canHaveModifiers(statement)
      ? ts.getModifiers(statement)?.some((modifier) => modifier.kind === ts.SyntaxKind.ExportKeyword)
      : false;
    if (ts.isVariableStatement(statement) && isExported) {
      return statement.declarationList.declarations.map((declaration) => {
        const name = declaration.name.getText(ast);
        return { name, wrapper: wrapperOf(ast, name) };
      });
    }
    if (ts.isFunctionDeclaration(statement) && isExported) {
      return [{ name: statement.name?.text ?? "default", wrapper: "function" }];
    }
    if (ts.isExportDeclaration(statement) && statement.exportClause && ts.isNamedExports(statement.exportClause)) {
      return statement.exportClause.elements.map(({ name, propertyName }) => {
        const local = (propertyName ?? name).text;
        return { name: name.text, wrapper: statement.moduleSpecifier ? local : wrapperOf(ast, local) };
      });
    }
    return [];
  });
}

describe("every way in goes through a wrapper", () => {
  // next-auth has its own checks (CSRF token), and limit-sign-in stands before it.
  const own = "app/api/auth/[...nextauth]/route.ts";

  it("for routes: withScope or withPublic, or the refusal of a method", () => {
    const routes = files.filter((file) => /^app\/.*\/route\.ts$/.test(file.name) && file.name !== own);
    expect(routes.length).toBeGreaterThan(0);
    const open = routes.flatMap((file) =>
      exportsOf(file)
        .filter(({ name }) => /^[A-Z]+$/.test(name))
        .filter(({ wrapper }) => !["withScope", "withPublic", "refuseMethod"].includes(wrapper ?? ""))
        .map(({ name, wrapper }) => `${file.name} ${name}: ${wrapper ?? "not found"}`),
    );
    expect(open).toEqual([]);
  });

  it("for server actions: action()", () => {
    const actions = files.filter(
      (file) => /^\s*["']use server["']/m.test(file.text) && !file.name.startsWith("tests/"),
    );
    const open = actions.flatMap((file) =>
      exportsOf(file)
        .filter(({ wrapper }) => wrapper !== "action")
        .map(({ name }) => `${file.name} ${name}`),
    );
    expect(open).toEqual([]);
  });
});

const lineCount = (file: SourceFile) => file.text.split("\n").length;

/** A file or function over the limit says why in the first comment of the file. */
function hasReason(file: SourceFile): boolean {
  const [first] = ts.getLeadingCommentRanges(file.text, 0) ?? [];
  return first !== undefined && file.text.slice(first.pos, first.end).length > 40;
}

function longFunctions(file: SourceFile, limit: number): string[] {
  const found: string[] = [];
  file.ast.forEachChild(function visit(node) {
    const isNamed =
      ts.isFunctionDeclaration(node) ||
      ts.isMethodDeclaration(node) ||
      (ts.isVariableDeclaration(node) && node.initializer !== undefined && ts.isArrowFunction(node.initializer));
    if (isNamed) {
      const start = file.ast.getLineAndCharacterOfPosition(node.getStart(file.ast)).line;
      const end = file.ast.getLineAndCharacterOfPosition(node.end).line;
      if (end - start + 1 > limit) found.push(`${file.name} ${node.name?.getText(file.ast)}: ${end - start + 1} lines`);
    }
    node.forEachChild(visit);
  });
  return found;
}

describe("sizes and names", () => {
  const written = files.filter((file) => /^(app|components|db|lib|proxy|scripts)/.test(file.name));

  it("keeps a file under 400 lines and a function under 60, or says why at the top", () => {
    const longFiles = written.filter((file) => lineCount(file) > 400 && !hasReason(file));
    expect(longFiles.map((file) => `${file.name}: ${lineCount(file)} lines`)).toEqual([]);
    // What a component returns is a picture more than a procedure; kernels and their loops say so.
    const procedures = written.filter((file) => file.name.endsWith(".ts") && !hasReason(file));
    expect(procedures.flatMap((file) => longFunctions(file, 60))).toEqual([]);
  });

  it("keeps routes under 40 lines and pages under 60", () => {
    const over = written.filter(
      (file) =>
        (/(^|\/)route\.ts$/.test(file.name) && lineCount(file) > 40) ||
        (/(^|\/)page\.tsx$/.test(file.name) && lineCount(file) > 60),
    );
    expect(over.map((file) => `${file.name}: ${lineCount(file)} lines`)).toEqual([]);
  });

  it("has no drawer for leftovers", () => {
    const drawers = files.filter((file) => /(^|\/)(utils?|helpers?|common|misc)(\.tsx?$|\/)/.test(file.name));
    expect(drawers.map((file) => file.name)).toEqual([]);
  });

  it("names files in kebab-case", () => {
    const odd = files
      .map((file) => path.basename(file.name))
      .filter((name) => !/^[a-z0-9]+([.-][a-z0-9]+)*\.tsx?$/.test(name));
    expect(odd).toEqual([]);
  });

  it("leaves no way round the type checker or the linter, and no test switched off", () => {
    const forbidden = [
      /@ts-(ignore|nocheck|expect-error)/,
      /eslint-disable/,
      /\bas any\b/,
      /:\s*any\b/,
      /\b(it|test|describe)\.(skip|only)\b/,
    ];
    const self = "tests/architecture.test.ts";
    const found = files
      .filter((file) => file.name !== self)
      .flatMap((file) =>
        forbidden.filter((pattern) => pattern.test(file.text)).map((pattern) => `${file.name} ${pattern}`),
      );
    expect(found).toEqual([]);
  });
});

describe("DEVELOPERS.md", () => {
  it("names only paths that exist", () => {
    const text = readFileSync("DEVELOPERS.md", "utf8");
    const named = [
      ...text.matchAll(/`((?:app|components|db|lib|scripts|tests|fixtures|public|\.ci)\/[^`\s*<>{}…]*)`/g),
    ].map((match) => match[1]!.replace(/[.,;:]$/, "").replace(/\(\)$/, ""));
    expect(named.length).toBeGreaterThan(0);
    expect(named.filter((name) => !existsSync(name))).toEqual([]);
  });
});
