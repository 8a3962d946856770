import { and, desc, eq } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { recipes } from "@/db/schema";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Scope } from "@/lib/scope";

export type RecipeRow = typeof recipes.$inferSelect;
type Organisation = Pick<Scope, "organisationId">;

export async function listRecipes(tx: Transaction, scope: Organisation): Promise<RecipeRow[]> {
  return tx
    .select()
    .from(recipes)
    .where(eq(recipes.organisationId, scope.organisationId))
    .orderBy(desc(recipes.createdAt))
    .limit(500);
}

/** Recipes for files with this header, the newest first. */
export async function findRecipesBySignature(
  tx: Transaction,
  scope: Organisation,
  headerSignature: string,
): Promise<RecipeRow[]> {
  return tx
    .select()
    .from(recipes)
    .where(and(eq(recipes.organisationId, scope.organisationId), eq(recipes.headerSignature, headerSignature)))
    .orderBy(desc(recipes.createdAt))
    .limit(10);
}

export async function findRecipe(tx: Transaction, scope: Organisation, id: string): Promise<RecipeRow | null> {
  const [row] = await tx
    .select()
    .from(recipes)
    .where(and(eq(recipes.organisationId, scope.organisationId), eq(recipes.id, id)));
  return row ?? null;
}

/** Keeps a mapping under a name; the same name with the same header is replaced. */
export async function saveRecipe(
  tx: Transaction,
  scope: Scope,
  input: { id: string; name: string; headerSignature: string; mapping: LogMapping },
): Promise<string> {
  const own = eq(recipes.organisationId, scope.organisationId);
  const same = and(own, eq(recipes.name, input.name), eq(recipes.headerSignature, input.headerSignature));
  const [replaced] = await tx
    .update(recipes)
    .set({ mapping: input.mapping, createdBy: scope.userId, createdAt: new Date() })
    .where(same)
    .returning({ id: recipes.id });
  if (replaced) return replaced.id;
  await tx.insert(recipes).values({ ...input, organisationId: scope.organisationId, createdBy: scope.userId });
  return input.id;
}

export async function markRecipeUsed(tx: Transaction, scope: Organisation, id: string): Promise<void> {
  await tx
    .update(recipes)
    .set({ usedAt: new Date() })
    .where(and(eq(recipes.organisationId, scope.organisationId), eq(recipes.id, id)));
}

/** False when there is none. */
export async function deleteRecipe(tx: Transaction, scope: Scope, id: string): Promise<boolean> {
  const gone = await tx
    .delete(recipes)
    .where(and(eq(recipes.organisationId, scope.organisationId), eq(recipes.id, id)))
    .returning({ id: recipes.id });
  return gone.length > 0;
}
