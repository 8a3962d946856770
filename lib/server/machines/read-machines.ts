import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { getMachine, listMachines as listMachineRows, type MachineRow } from "@/db/queries/machines";
import { AppError } from "@/lib/errors";
import type { ListQuery } from "@/lib/schemas/listing";
import type { MachineReply } from "@/lib/schemas/machines";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";
import { describeMachine } from "@/lib/server/machines/describe-machine";

export async function listMachines(
  _container: Container,
  scope: Scope,
  query: ListQuery,
): Promise<{ items: MachineReply[]; nextCursor: string | null }> {
  const { rows, nextCursor } = await withOrganisation(scope, (tx) => listMachineRows(tx, scope, query));
  return { items: rows.map(describeMachine), nextCursor };
}

/** @throws AppError `not_found` */
export async function getMachineOrThrow(tx: Transaction, scope: Scope, machineId: string): Promise<MachineRow> {
  const row = await getMachine(tx, scope, machineId);
  if (!row) throw new AppError("not_found", "There is no such machine.");
  return row;
}

export async function readMachine(_container: Container, scope: Scope, machineId: string): Promise<MachineReply> {
  return describeMachine(await withOrganisation(scope, (tx) => getMachineOrThrow(tx, scope, machineId)));
}
