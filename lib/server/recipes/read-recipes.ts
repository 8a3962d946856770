import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { deleteRecipe as deleteRecipeRow, listRecipes as listRecipeRows } from "@/db/queries/recipes";
import { AppError } from "@/lib/errors";
import type { Recipe } from "@/lib/schemas/recipes";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";

/** Saved meanings of columns, the newest first. */
export async function listRecipes(
  _container: Container,
  scope: Scope,
): Promise<{ items: Recipe[]; nextCursor: string | null }> {
  const rows = await withOrganisation(scope, (tx) => listRecipeRows(tx, scope));
  const items = rows.map((row) => ({
    id: row.id,
    name: row.name,
    mapping: row.mapping,
    createdAt: row.createdAt.toISOString(),
    usedAt: row.usedAt?.toISOString() ?? null,
  }));
  return { items, nextCursor: null };
}

/** Forgets a recipe; logs read with it keep their mapping. @throws AppError `not_found` */
export async function deleteRecipe(_container: Container, scope: Scope, recipeId: string): Promise<void> {
  await withOrganisation(scope, async (tx) => {
    if (!(await deleteRecipeRow(tx, scope, recipeId))) throw new AppError("not_found", "There is no such recipe.");
    await recordAudit(tx, scope, { action: "recipe.delete", subject: recipeId });
  });
}
