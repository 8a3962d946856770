import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import {
  findRecipeAtVersion,
  listRecipes as listRecipeRows,
  listRecipeVersions,
  type RecipeAtVersion,
} from "@/db/queries/recipes";
import { AppError } from "@/lib/errors";
import { RECIPE_SCHEMA_VERSION, type Recipe, type RecipeDetail, type RecipeFile } from "@/lib/schemas/recipes";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { describeRecipe, describeRecipeVersion } from "@/lib/server/recipes/describe-recipe";

/** Saved meanings of columns, the last changed first; or those deleted. */
export async function listRecipes(
  _container: Container,
  scope: Scope,
  query: { deleted: boolean },
): Promise<{ items: Recipe[]; nextCursor: string | null }> {
  const rows = await withOrganisation(scope, (tx) => listRecipeRows(tx, scope, query));
  return { items: rows.map(describeRecipe), nextCursor: null };
}

/** @throws AppError `not_found` for an absent recipe and an absent version */
export async function getRecipeOrThrow(
  tx: Transaction,
  scope: Scope,
  { recipeId, version }: { recipeId: string; version?: number },
): Promise<RecipeAtVersion> {
  const found = await findRecipeAtVersion(tx, scope, { id: recipeId, version: version ?? "newest" });
  if (found) return found;
  throw new AppError(
    "not_found",
    `There is no such recipe${version === undefined ? "" : ` or version ${version} of it`}.`,
  );
}

/** A recipe with its history; `version` puts an earlier one in front. @throws AppError `not_found` */
export async function readRecipe(
  _container: Container,
  scope: Scope,
  input: { recipeId: string; version?: number },
): Promise<RecipeDetail> {
  return withOrganisation(scope, async (tx) => {
    const found = await getRecipeOrThrow(tx, scope, input);
    const versions = await listRecipeVersions(tx, scope, input.recipeId);
    return { ...describeRecipe(found), versions: versions.map(describeRecipeVersion) };
  });
}

/** A version of a recipe as a file. @throws AppError `not_found` */
export async function exportRecipe(
  container: Container,
  scope: Scope,
  input: { recipeId: string; version?: number },
): Promise<RecipeFile> {
  const found = await withOrganisation(scope, (tx) => getRecipeOrThrow(tx, scope, input));
  const { name, version, format, columnNames, mapping, machine, note } = describeRecipe(found);
  return {
    kind: "coulterbook-recipe",
    schemaVersion: RECIPE_SCHEMA_VERSION,
    name,
    version,
    format,
    columnNames,
    mapping,
    machine,
    note,
    exportedAt: container.clock.now().toISOString(),
  };
}
