import "server-only";
import type { FieldRow } from "@/db/queries/fields";
import type { Field } from "@/lib/schemas/fields";

/** A field as the API shows it. */
export function describeField(row: FieldRow): Field {
  return {
    id: row.id,
    name: row.name,
    farm: row.farm,
    landowner: row.landowner,
    areaM2: row.areaM2,
    boundary: row.boundary,
    logCount: row.logCount,
    lastLogAt: row.lastLogAt?.toISOString() ?? null,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
  };
}
