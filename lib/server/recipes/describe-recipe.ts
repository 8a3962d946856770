import type { RecipeAtVersion, RecipeVersionRow } from "@/db/queries/recipes";
import type { Recipe, RecipeVersion } from "@/lib/schemas/recipes";

/** One version as the API tells it. */
export function describeRecipeVersion(row: RecipeVersionRow): RecipeVersion {
  return {
    version: row.version,
    format: row.format,
    shape: row.mapping.shape,
    columnNames: row.columnNames,
    mapping: row.mapping,
    machine: row.machine,
    note: row.note,
    createdAt: row.createdAt.toISOString(),
    createdBy: row.createdBy === null ? null : { id: row.createdBy, name: row.authorName },
  };
}

/** A recipe at one of its versions as the API tells it. */
export function describeRecipe({ recipe, version, logCount }: RecipeAtVersion): Recipe {
  return {
    ...describeRecipeVersion(version),
    id: recipe.id,
    name: recipe.name,
    usedAt: recipe.usedAt?.toISOString() ?? null,
    logCount,
    deletedAt: recipe.deletedAt?.toISOString() ?? null,
  };
}
