import { AppError } from "@/lib/errors";
import { IngestFailure } from "@/lib/ingest/ingest-error";
import { buildReadPlan } from "@/lib/ingest/records/read-plan";
import type { RecipeInput } from "@/lib/schemas/recipes";
import { mappingError } from "@/lib/server/logs/mapping-error";

/**
 * The header that a recipe is for, after a look whether the recipe can read such a file: every column it names is there,
 * units fit channels, rows do not repeat. @throws AppError `unprocessable` naming the column and the rule
 */
export function checkRecipe({ mapping, columnNames }: Pick<RecipeInput, "mapping" | "columnNames">): string[] {
  const names = columnNames ?? [...new Set(mapping.columns.map((column) => column.name))];
  const absent = mapping.columns.findIndex((column) => !names.includes(column.name));
  if (absent >= 0) {
    const message = `'${mapping.columns[absent]?.name ?? ""}' is not among columnNames`;
    const path = `mapping.columns.${absent}.name`;
    throw new AppError("unprocessable", `${path}: ${message}.`, { places: [{ path, message }] });
  }
  try {
    buildReadPlan(mapping, names);
  } catch (error) {
    if (error instanceof IngestFailure) throw mappingError(error.error);
    throw error;
  }
  return names;
}
