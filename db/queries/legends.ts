import { and, asc, eq } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { legends, users } from "@/db/schema";
import type { Scope } from "@/lib/scope";

export type LegendRow = typeof legends.$inferSelect & { savedByName: string | null };
type Organisation = Pick<Scope, "organisationId">;

/** The organisation's legends by name of the channel. */
export async function listLegends(tx: Transaction, scope: Organisation): Promise<LegendRow[]> {
  const rows = await tx
    .select({ legend: legends, savedByName: users.name })
    .from(legends)
    .leftJoin(users, eq(users.id, legends.savedBy))
    .where(eq(legends.organisationId, scope.organisationId))
    .orderBy(asc(legends.channel));
  return rows.map(({ legend, savedByName }) => ({ ...legend, savedByName }));
}

/** Keeps the legend of a channel in place of the one before. */
export async function saveLegend(
  tx: Transaction,
  scope: Scope,
  said: Pick<LegendRow, "channel" | "unit" | "edges" | "savedAt">,
): Promise<void> {
  const changes = { unit: said.unit, edges: said.edges, savedAt: said.savedAt, savedBy: scope.userId || null };
  await tx
    .insert(legends)
    .values({ ...changes, channel: said.channel, organisationId: scope.organisationId })
    .onConflictDoUpdate({ target: [legends.organisationId, legends.channel], set: changes });
}

export async function deleteLegend(tx: Transaction, scope: Organisation, channel: string): Promise<void> {
  await tx.delete(legends).where(and(eq(legends.organisationId, scope.organisationId), eq(legends.channel, channel)));
}
