import { and, asc, eq, sql } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { logs, machines } from "@/db/schema";
import type { Machine } from "@/lib/machines/machine";
import { decodeCursor, pageOf } from "@/lib/paging/cursor";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Scope } from "@/lib/scope";

export type MachineRow = typeof machines.$inferSelect;

function isMachine(scope: Scope, machineId: string) {
  return and(eq(machines.organisationId, scope.organisationId), eq(machines.id, machineId));
}

/** Machines by name, a page at a time. */
export async function listMachines(tx: Transaction, scope: Scope, query: ListQuery) {
  const after = decodeCursor(query.cursor);
  const later = after ? sql`(${machines.name}, ${machines.id}) > (${after[0]}, ${after[1]})` : undefined;
  const rows = await tx
    .select()
    .from(machines)
    .where(and(eq(machines.organisationId, scope.organisationId), later))
    .orderBy(asc(machines.name), asc(machines.id))
    .limit(query.limit + 1);
  return pageOf(rows, query.limit, (row) => [row.name, row.id]);
}

export async function getMachine(tx: Transaction, scope: Scope, machineId: string): Promise<MachineRow | null> {
  const [row] = await tx.select().from(machines).where(isMachine(scope, machineId));
  return row ?? null;
}

export async function insertMachine(
  tx: Transaction,
  scope: Scope,
  input: { id: string; body: Machine },
): Promise<MachineRow> {
  const { kind, name } = input.body;
  const [row] = await tx
    .insert(machines)
    .values({ ...input, kind, name, organisationId: scope.organisationId })
    .returning();
  if (!row) throw new Error("insertMachine returned no row");
  return row;
}

export async function updateMachine(
  tx: Transaction,
  scope: Scope,
  input: { machineId: string; body: Machine; at: Date },
): Promise<void> {
  const { kind, name } = input.body;
  await tx
    .update(machines)
    .set({ body: input.body, kind, name, updatedAt: input.at })
    .where(isMachine(scope, input.machineId));
}

export async function deleteMachineRow(tx: Transaction, scope: Scope, machineId: string): Promise<void> {
  await tx.delete(machines).where(isMachine(scope, machineId));
}

/** How many logs were placed with this machine; each keeps its own copy of the machine as it was. */
export async function countLogsOfMachine(tx: Transaction, scope: Scope, machineId: string): Promise<number> {
  const [row] = await tx
    .select({ n: sql<number>`count(*)::int` })
    .from(logs)
    .where(and(eq(logs.organisationId, scope.organisationId), eq(logs.machineId, machineId)));
  return row?.n ?? 0;
}

/** Logs placed with a machine that goes away keep their copy of it, but no longer name it. */
export async function forgetMachineInLogs(tx: Transaction, scope: Scope, machineId: string): Promise<void> {
  await tx
    .update(logs)
    .set({ machineId: null })
    .where(and(eq(logs.organisationId, scope.organisationId), eq(logs.machineId, machineId)));
}
