import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { deleteLegend, listLegends, saveLegend } from "@/db/queries/legends";
import { can } from "@/lib/access/permissions";
import type { LegendInput, LegendList } from "@/lib/schemas/legends";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";

/** The class edges that the organisation sees its channels in. */
export async function readLegends(_container: Container, scope: Scope): Promise<LegendList> {
  return withOrganisation(scope, (tx) => describeLegends(tx, scope));
}

async function describeLegends(tx: Transaction, scope: Scope): Promise<LegendList> {
  const rows = await listLegends(tx, scope);
  const items = rows.map(({ channel, unit, edges, savedByName, savedAt }) => ({
    channel,
    unit,
    edges,
    savedBy: savedByName === null ? null : { name: savedByName },
    savedAt: savedAt.toISOString(),
  }));
  return { items, nextCursor: null, changeable: can(scope.role, "legends.write") };
}

/** Keeps, or with null edges takes away, the legend of a channel; answers all of them. */
export async function changeLegend(container: Container, scope: Scope, input: LegendInput): Promise<LegendList> {
  const { channel, unit, edges } = input;
  return withOrganisation(scope, async (tx) => {
    if (edges) await saveLegend(tx, scope, { channel, unit, edges, savedAt: container.clock.now() });
    else await deleteLegend(tx, scope, channel);
    const detail = edges ? { unit, edges } : {};
    await recordAudit(tx, scope, { action: edges ? "legend.save" : "legend.delete", subject: channel, detail });
    return describeLegends(tx, scope);
  });
}
