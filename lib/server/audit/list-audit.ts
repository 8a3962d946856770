import "server-only";
import { withOrganisation } from "@/db/client";
import { listAudit as listAuditRows } from "@/db/queries/audit";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";

export async function listAudit(_container: Container, scope: Scope, query: ListQuery) {
  const { rows, nextCursor } = await withOrganisation(scope, (tx) => listAuditRows(tx, scope, query));
  return { items: rows.map((row) => ({ ...row, at: row.at.toISOString() })), nextCursor };
}
