import { and, desc, eq, isNotNull, isNull, sql } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { logs, recipes, recipeVersions, users } from "@/db/schema";
import type { LogFormatId } from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Machine } from "@/lib/machines/machine";
import type { Scope } from "@/lib/scope";

export type RecipeRow = typeof recipes.$inferSelect;
export type RecipeVersionRow = typeof recipeVersions.$inferSelect & { authorName: string | null };
type Organisation = Pick<Scope, "organisationId">;

/** A recipe beside one of its versions. */
export interface RecipeAtVersion {
  recipe: RecipeRow;
  version: RecipeVersionRow;
  logCount: number;
}

export interface RecipeSaving {
  /** For a recipe that is not there yet. */
  id: string;
  name: string;
  format: LogFormatId;
  columnNames: string[];
  headerSignature: string;
  mapping: LogMapping;
  machine?: Machine | null;
  note?: string | null;
}

/** What a log or a file is told about the recipe it is read with. */
export interface RecipeReference {
  id: string;
  name: string;
  version: number;
}

const isOwn = (scope: Organisation) => eq(recipes.organisationId, scope.organisationId);
const isRecipe = (scope: Organisation, id: string) => and(isOwn(scope), eq(recipes.id, id));

function selectAtVersion(tx: Transaction, version: number | "newest") {
  const logCount = sql<number>`(select count(*)::int from ${logs} where ${logs.organisationId} = ${recipes.organisationId} and ${logs.recipeId} = ${recipes.id})`;
  const own = and(
    eq(recipeVersions.organisationId, recipes.organisationId),
    eq(recipeVersions.recipeId, recipes.id),
    eq(recipeVersions.version, version === "newest" ? recipes.version : version),
  );
  return tx
    .select({ recipe: recipes, version: recipeVersions, authorName: users.name, logCount })
    .from(recipes)
    .innerJoin(recipeVersions, own)
    .leftJoin(users, eq(users.id, recipeVersions.createdBy));
}

type Selected = Awaited<ReturnType<typeof selectAtVersion>>[number];

function toRecipeAtVersion({ recipe, version, authorName, logCount }: Selected): RecipeAtVersion {
  return { recipe, version: { ...version, authorName }, logCount };
}

/** Recipes with their newest version, the last changed first; or those deleted. */
export async function listRecipes(
  tx: Transaction,
  scope: Organisation,
  { deleted }: { deleted: boolean },
): Promise<RecipeAtVersion[]> {
  const rows = await selectAtVersion(tx, "newest")
    .where(and(isOwn(scope), deleted ? isNotNull(recipes.deletedAt) : isNull(recipes.deletedAt)))
    .orderBy(desc(recipeVersions.createdAt), recipes.id)
    .limit(500);
  return rows.map(toRecipeAtVersion);
}

/** A recipe with one of its versions, deleted or not; null where either is absent. */
export async function findRecipeAtVersion(
  tx: Transaction,
  scope: Organisation,
  { id, version }: { id: string; version: number | "newest" },
): Promise<RecipeAtVersion | null> {
  const [row] = await selectAtVersion(tx, version).where(isRecipe(scope, id));
  return row ? toRecipeAtVersion(row) : null;
}

/** All versions, the newest first. */
export async function listRecipeVersions(
  tx: Transaction,
  scope: Organisation,
  recipeId: string,
): Promise<RecipeVersionRow[]> {
  const rows = await tx
    .select({ version: recipeVersions, authorName: users.name })
    .from(recipeVersions)
    .leftJoin(users, eq(users.id, recipeVersions.createdBy))
    .where(and(eq(recipeVersions.organisationId, scope.organisationId), eq(recipeVersions.recipeId, recipeId)))
    .orderBy(desc(recipeVersions.version));
  return rows.map(({ version, authorName }) => ({ ...version, authorName }));
}

/** Versions in force for files with this header: of each recipe the newest that knows it, the last saved first. */
export async function findRecipesBySignature(
  tx: Transaction,
  scope: Organisation,
  headerSignature: string,
): Promise<(RecipeReference & { mapping: LogMapping })[]> {
  const own = and(eq(recipeVersions.organisationId, recipes.organisationId), eq(recipeVersions.recipeId, recipes.id));
  const rows = await tx
    .select({
      id: recipes.id,
      name: recipes.name,
      version: recipeVersions.version,
      mapping: recipeVersions.mapping,
    })
    .from(recipeVersions)
    .innerJoin(recipes, own)
    .where(
      and(
        isOwn(scope),
        isNull(recipes.deletedAt),
        sql`md5(${recipeVersions.headerSignature}) = md5(${headerSignature})`,
        eq(recipeVersions.headerSignature, headerSignature),
      ),
    )
    .orderBy(desc(recipeVersions.createdAt), desc(recipeVersions.version))
    .limit(50);
  const seen = new Set<string>();
  return rows.filter(({ id }) => !seen.has(id) && seen.add(id));
}

/** Locks the recipe of this name until the end of the transaction, so that two savings cannot both make one version. */
async function lockByName(tx: Transaction, scope: Organisation, name: string): Promise<RecipeRow | null> {
  const [row] = await tx
    .select()
    .from(recipes)
    .where(and(isOwn(scope), eq(recipes.name, name), isNull(recipes.deletedAt)))
    .for("update");
  return row ?? null;
}

async function findOrInsert(tx: Transaction, scope: Scope, { id, name }: RecipeSaving): Promise<RecipeRow> {
  const [made] = await tx
    .insert(recipes)
    .values({ id, name, version: 0, organisationId: scope.organisationId, createdBy: scope.userId || null })
    .onConflictDoNothing()
    .returning();
  const row = made ?? (await lockByName(tx, scope, name));
  if (!row) throw new Error(`the recipe "${name}" was neither made nor found`);
  return row;
}

/** Keeps a mapping under a name; where the name is there already, as its next version. */
export async function saveRecipe(tx: Transaction, scope: Scope, input: RecipeSaving): Promise<RecipeReference> {
  const recipe = await findOrInsert(tx, scope, input);
  return addRecipeVersion(tx, scope, { ...input, recipe });
}

/** The caller holds the recipe's lock. */
export async function addRecipeVersion(
  tx: Transaction,
  scope: Scope,
  { recipe, ...input }: Omit<RecipeSaving, "id" | "name"> & { recipe: RecipeRow },
): Promise<RecipeReference> {
  const { organisationId } = scope;
  const version = recipe.version + 1;
  const { format, columnNames, headerSignature, mapping, machine = null, note = null } = input;
  const said = { format, columnNames, headerSignature, mapping, machine, note };
  await tx
    .insert(recipeVersions)
    .values({ ...said, organisationId, recipeId: recipe.id, version, createdBy: scope.userId || null });
  await tx.update(recipes).set({ version }).where(isRecipe(scope, recipe.id));
  return { id: recipe.id, name: recipe.name, version };
}

/** Locks a recipe for a change. */
export async function lockRecipe(tx: Transaction, scope: Organisation, id: string): Promise<RecipeRow | null> {
  const [row] = await tx.select().from(recipes).where(isRecipe(scope, id)).for("update");
  return row ?? null;
}

export async function isRecipeNameTaken(
  tx: Transaction,
  scope: Organisation,
  { id, name }: { id: string; name: string },
): Promise<boolean> {
  const holder = await lockByName(tx, scope, name);
  return holder !== null && holder.id !== id;
}

export async function changeRecipe(
  tx: Transaction,
  scope: Organisation,
  { id, ...change }: { id: string } & Partial<Pick<RecipeRow, "name" | "usedAt" | "deletedAt">>,
): Promise<void> {
  await tx.update(recipes).set(change).where(isRecipe(scope, id));
}
