import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { RecipesPage } from "@/components/recipes/recipes-page";
import { RecipeFile, RecipeVersion, type Recipe } from "@/lib/schemas/recipes";
import { makeRecipe } from "@/tests/components/recipes/make-recipe";

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

interface Asked {
  method: string;
  path: string;
  body: unknown;
}

/** A server that holds one recipe, in force or deleted. */
function serve(recipe: Recipe, refusal?: { method: string; path: string; body: { status: number } }) {
  const asked: Asked[] = [];
  let isDeleted = false;
  let name = recipe.name;
  vi.stubGlobal("fetch", async (path: string, init: RequestInit = {}) => {
    const method = init.method ?? "GET";
    const body: unknown = typeof init.body === "string" ? JSON.parse(init.body) : undefined;
    asked.push({ method, path, body });
    if (refusal?.path === path && refusal.method === method) {
      return Response.json(refusal.body, { status: refusal.body.status });
    }
    const now = { ...recipe, name, deletedAt: isDeleted ? "2031-10-02T08:00:00.000Z" : null };
    if (method === "DELETE") {
      isDeleted = true;
      return new Response(null, { status: 204 });
    }
    if (path.endsWith("/restore")) {
      isDeleted = false;
      return Response.json({ ...now, deletedAt: null });
    }
    if (method === "PATCH") {
      name = (body as { name?: string }).name ?? name;
      return Response.json({ ...now, name });
    }
    if (path.endsWith("/import")) return Response.json({ ...now, version: 3 }, { status: 201 });
    if (path.startsWith("/api/v1/recipes/")) {
      const version = RecipeVersion.parse(now);
      return Response.json({ ...now, versions: [version, { ...version, version: 1, note: "first try" }] });
    }
    const items = isDeleted === path.includes("deleted=1") ? [now] : [];
    return Response.json({ items, nextCursor: null });
  });
  return asked;
}

function open(mayWrite = true) {
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <RecipesPage mayWrite={mayWrite} />
    </QueryClientProvider>,
  );
}

describe("the recipes of an organisation", () => {
  it("are listed with what they read, who saved them and when they were used", async () => {
    serve(makeRecipe());
    open();
    const line = within(await screen.findByRole("table", { name: "Recipes of this organisation" })).getAllByRole(
      "row",
    )[1]!;
    expect(line).toHaveTextContent("downforce and margin; 3 rows");
    expect(line).toHaveTextContent("Ada Field");
    expect(line).toHaveTextContent("14 October 2031");
    expect(within(line).getByRole("link", { name: "Export Drill, pounds" })).toHaveAttribute(
      "href",
      "/api/v1/recipes/rcp_drill/export",
    );
  });

  it("say their columns in words, and older versions that can be used again", async () => {
    const asked = serve(makeRecipe());
    open();
    await userEvent.click(await screen.findByRole("button", { name: "Drill, pounds" }));
    const sheet = within(await screen.findByRole("dialog", { name: "Drill, pounds" }));
    expect(await sheet.findByText("DF_1 … DF_3")).toBeVisible();
    expect(sheet.getByText("downforce of rows 1 to 3, in pounds-force; -999 for missing")).toBeVisible();
    await userEvent.click(sheet.getByRole("button", { name: "Use version 1 again" }));
    expect(asked.find(({ method }) => method === "PATCH")?.body).toEqual({ useVersion: 1 });
  });

  it("are deleted and brought back", async () => {
    const asked = serve(makeRecipe());
    open();
    await userEvent.click(await screen.findByRole("button", { name: "Delete Drill, pounds" }));
    expect(await screen.findByText("No recipe yet")).toBeVisible();
    await userEvent.click(screen.getByRole("button", { name: "Undo" }));
    expect(await screen.findByRole("button", { name: "Drill, pounds" })).toBeVisible();
    expect(asked.map(({ method, path }) => `${method} ${path}`)).toContain("POST /api/v1/recipes/rcp_drill/restore");
  });

  it("get another name", async () => {
    const asked = serve(makeRecipe());
    open();
    await userEvent.click(await screen.findByRole("button", { name: "Rename Drill, pounds" }));
    const name = screen.getByRole("textbox", { name: "Name" });
    await userEvent.clear(name);
    await userEvent.type(name, "Drill 2031{Enter}");
    expect(await screen.findByRole("button", { name: "Drill 2031" })).toBeVisible();
    expect(asked.find(({ method }) => method === "PATCH")?.body).toEqual({ name: "Drill 2031" });
  });

  it("keep their name where the new one is taken, which is said at the name", async () => {
    const detail = "Choose another name: there is a recipe named “Combine” already.";
    const body = { type: "about:blank", title: "Conflict", status: 409, detail, code: "recipe_name_taken" };
    serve(makeRecipe(), { method: "PATCH", path: "/api/v1/recipes/rcp_drill", body });
    open();
    await userEvent.click(await screen.findByRole("button", { name: "Rename Drill, pounds" }));
    await userEvent.clear(screen.getByRole("textbox", { name: "Name" }));
    await userEvent.type(screen.getByRole("textbox", { name: "Name" }), "Combine{Enter}");
    expect(await screen.findByText(detail)).toBeVisible();
    expect(screen.getByRole("textbox", { name: "Name" })).toHaveAccessibleDescription(detail);
  });

  it("are taken in from a file, or refused place by place", async () => {
    const problem = {
      type: "about:blank",
      title: "Not valid",
      status: 422,
      detail: "The recipe is not complete.",
      code: "unprocessable",
      errors: [{ path: "mapping.columns.3.unit", message: 'unknown unit "stone"' }],
    };
    serve(makeRecipe(), { method: "POST", path: "/api/v1/recipes/import", body: problem });
    open();
    await screen.findByRole("table", { name: "Recipes of this organisation" });
    await userEvent.upload(screen.getByLabelText("Recipe file"), new File(["{]"], "drill.recipe.json"));
    expect(await screen.findByText("“drill.recipe.json” is no recipe: it cannot be read as JSON.")).toBeVisible();
    await userEvent.upload(screen.getByLabelText("Recipe file"), new File(["{}"], "drill.recipe.json"));
    const alert = await screen.findByText("This recipe cannot be used as it stands.");
    expect(alert.closest('[role="alert"]')).toHaveTextContent('mapping.columns.3.unit: unknown unit "stone"');
    expect(screen.getByText(/unknown unit/)).toBeVisible();
  });

  it("are not to be had from a file of something else, which is said in plain words until the next action", async () => {
    // As the server's own schema refuses such a file.
    const issues = RecipeFile.safeParse({ crop: "wheat" }).error?.issues ?? [];
    const errors = issues.map(({ path, message }) => ({ path: path.join("."), message }));
    expect(errors.length).toBeGreaterThan(1);
    const problem = {
      type: "about:blank",
      title: "Not valid",
      status: 422,
      detail: 'kind: Invalid input: expected "coulterbook-recipe".',
      code: "unprocessable",
      errors,
    };
    serve(makeRecipe(), { method: "POST", path: "/api/v1/recipes/import", body: problem });
    open();
    await screen.findByRole("table", { name: "Recipes of this organisation" });
    await userEvent.upload(screen.getByLabelText("Recipe file"), new File(["{}"], "other.json"));
    expect(await screen.findByText("This is not a recipe file of this program.")).toBeVisible();
    expect(screen.getByText("kind")).not.toBeVisible();
    await userEvent.click(screen.getByText("Where it is not as it should be"));
    expect(screen.getByText("kind")).toBeVisible();
    await userEvent.click(screen.getByRole("button", { name: "Delete Drill, pounds" }));
    await screen.findByText(/was deleted/);
    expect(screen.queryByText("This is not a recipe file of this program.")).toBeNull();
  });

  it("can be looked at only, where the role is to look", async () => {
    serve(makeRecipe());
    open(false);
    await screen.findByRole("button", { name: "Drill, pounds" });
    expect(screen.queryByRole("button", { name: /^(Rename|Delete|Take in)/ })).toBeNull();
  });
});
