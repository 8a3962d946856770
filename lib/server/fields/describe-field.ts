import "server-only";
import type { FieldRow } from "@/db/queries/fields";
import type { NewestLogRow } from "@/db/queries/newest-logs";
import type { Field } from "@/lib/schemas/fields";

/** A field as the API shows it; `newest` is the log that speaks for it, where it has one. */
export function describeField(row: FieldRow, newest: NewestLogRow | undefined): Field {
  return {
    id: row.id,
    name: row.name,
    farm: row.farm,
    landowner: row.landowner,
    areaM2: row.areaM2,
    boundary: row.boundary,
    logCount: row.logCount,
    lastLogAt: row.lastLogAt?.toISOString() ?? null,
    newestLog: newest ? describeNewest(newest) : null,
    waitingLogs: newest?.waiting ?? 0,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
  };
}

function describeNewest({ id, name, kind, status, isElsewhere, severity }: NewestLogRow): Field["newestLog"] {
  return { id, name, kind, status, isElsewhere, severity };
}
