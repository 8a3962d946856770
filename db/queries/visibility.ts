import { and, eq, exists, ne, or, sql, type SQL } from "drizzle-orm";
import { QueryBuilder, type AnyPgColumn } from "drizzle-orm/pg-core";
import { fieldGrants } from "@/db/schema";
import type { Scope } from "@/lib/scope";

// Role rules that depend on the row live here, in the `where` of every query: absent and forbidden read the same.

function isGranted(scope: Scope, fieldId: AnyPgColumn): SQL {
  const grant = new QueryBuilder({ casing: "snake_case" })
    .select({ one: sql`1` })
    .from(fieldGrants)
    .where(
      and(
        eq(fieldGrants.organisationId, scope.organisationId),
        eq(fieldGrants.userId, scope.userId),
        eq(fieldGrants.fieldId, fieldId),
      ),
    );
  return exists(grant);
}

/** A viewer sees the fields given to them; everyone else all of the organisation's. */
export function visibleField(scope: Scope, fieldId: AnyPgColumn): SQL | undefined {
  return scope.role === "viewer" ? isGranted(scope, fieldId) : undefined;
}

/** Logs of visible fields; an operator sees a harvest log (a yield) only where the field is given to them. */
export function visibleLog(scope: Scope, fieldId: AnyPgColumn, kind: AnyPgColumn): SQL | undefined {
  if (scope.role === "operator") return or(ne(kind, "harvest"), isGranted(scope, fieldId));
  return visibleField(scope, fieldId);
}
