import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import {
  addRecipeVersion,
  changeRecipe,
  isRecipeNameTaken,
  lockRecipe,
  saveRecipe,
  type RecipeRow,
} from "@/db/queries/recipes";
import { AppError } from "@/lib/errors";
import { newId } from "@/lib/ids";
import { headerSignature } from "@/lib/ingest/mapping";
import type { Recipe, RecipeInput, RecipePatch } from "@/lib/schemas/recipes";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { checkRecipe } from "@/lib/server/recipes/check-recipe";
import { describeRecipe } from "@/lib/server/recipes/describe-recipe";
import { getRecipeOrThrow } from "@/lib/server/recipes/read-recipes";

/**
 * Keeps a recipe; under a name that is there already, as its next version.
 * @throws AppError `unprocessable` naming the column or path and the rule
 */
export async function createRecipe(
  _container: Container,
  scope: Scope,
  input: RecipeInput,
  action: "recipe.save" | "recipe.import" = "recipe.save",
): Promise<Recipe> {
  const { format, mapping } = input;
  const columnNames = checkRecipe(input);
  const columns = columnNames.map((name) => ({ name }));
  const signature = headerSignature({ format, shape: mapping.shape, columns });
  const said = { ...input, columnNames, headerSignature: signature };
  return withOrganisation(scope, async (tx) => {
    const { id, name, version } = await saveRecipe(tx, scope, { ...said, id: newId("recipe") });
    await recordAudit(tx, scope, { action, subject: id, detail: { name, version } });
    return describeRecipe(await getRecipeOrThrow(tx, scope, { recipeId: id }));
  });
}

async function lockRecipeOrThrow(tx: Transaction, scope: Scope, recipeId: string): Promise<RecipeRow> {
  const row = await lockRecipe(tx, scope, recipeId);
  if (!row) throw new AppError("not_found", "There is no such recipe.");
  return row;
}

async function refuseTakenName(tx: Transaction, scope: Scope, input: { id: string; name: string }): Promise<void> {
  if (!(await isRecipeNameTaken(tx, scope, input))) return;
  const message = `there is a recipe named “${input.name}” already`;
  throw new AppError("conflict", `Choose another name: ${message}.`, {
    detailCode: "recipe_name_taken",
    places: [{ path: "name", message }],
  });
}

function refuseDeleted(recipe: RecipeRow): void {
  if (recipe.deletedAt === null) return;
  throw new AppError("conflict", "This recipe was deleted. Restore it first.", { detailCode: "recipe_deleted" });
}

/** Renames a recipe, or makes an earlier version the newest again. @throws AppError `not_found`, `conflict` */
export async function updateRecipe(
  _container: Container,
  scope: Scope,
  { recipeId, patch }: { recipeId: string; patch: RecipePatch },
): Promise<Recipe> {
  return withOrganisation(scope, async (tx) => {
    const recipe = await lockRecipeOrThrow(tx, scope, recipeId);
    refuseDeleted(recipe);
    if (patch.name !== undefined && patch.name !== recipe.name) {
      await refuseTakenName(tx, scope, { id: recipeId, name: patch.name });
      await changeRecipe(tx, scope, { id: recipeId, name: patch.name });
    }
    if (patch.useVersion !== undefined)
      await useVersionAgain(tx, scope, { recipe, ...patch, version: patch.useVersion });
    const detail = { from: recipe.name, to: patch.name, useVersion: patch.useVersion };
    await recordAudit(tx, scope, { action: "recipe.change", subject: recipeId, detail });
    return describeRecipe(await getRecipeOrThrow(tx, scope, { recipeId }));
  });
}

async function useVersionAgain(
  tx: Transaction,
  scope: Scope,
  { recipe, version, note }: { recipe: RecipeRow; version: number; note?: string },
): Promise<void> {
  const found = await getRecipeOrThrow(tx, scope, { recipeId: recipe.id, version });
  await addRecipeVersion(tx, scope, { ...found.version, note: note ?? `Version ${version} again`, recipe });
}

/** Takes a recipe out of use; logs read with it keep naming it. @throws AppError `not_found` */
export async function deleteRecipe(container: Container, scope: Scope, recipeId: string): Promise<void> {
  await withOrganisation(scope, async (tx) => {
    const recipe = await lockRecipeOrThrow(tx, scope, recipeId);
    if (recipe.deletedAt) throw new AppError("not_found", "This recipe is deleted already.");
    await changeRecipe(tx, scope, { id: recipeId, deletedAt: container.clock.now() });
    await recordAudit(tx, scope, { action: "recipe.delete", subject: recipeId, detail: { name: recipe.name } });
  });
}

/** Undoes a deletion. @throws AppError `not_found`, `conflict` where another recipe took the name meanwhile */
export async function restoreRecipe(_container: Container, scope: Scope, recipeId: string): Promise<Recipe> {
  return withOrganisation(scope, async (tx) => {
    const recipe = await lockRecipeOrThrow(tx, scope, recipeId);
    if (recipe.deletedAt) {
      await refuseTakenName(tx, scope, recipe);
      await changeRecipe(tx, scope, { id: recipeId, deletedAt: null });
      await recordAudit(tx, scope, { action: "recipe.restore", subject: recipeId, detail: { name: recipe.name } });
    }
    return describeRecipe(await getRecipeOrThrow(tx, scope, { recipeId }));
  });
}
