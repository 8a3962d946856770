import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import {
  countLogsOfMachine,
  deleteMachineRow,
  forgetMachineInLogs,
  insertMachine,
  updateMachine as updateMachineRow,
} from "@/db/queries/machines";
import { describeChanges } from "@/lib/audit/describe-changes";
import { AppError } from "@/lib/errors";
import { newId } from "@/lib/ids";
import { MachineInput, type Machine } from "@/lib/machines/machine";
import type { MachineReply } from "@/lib/schemas/machines";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";
import { describeMachine } from "@/lib/server/machines/describe-machine";
import { getMachineOrThrow } from "@/lib/server/machines/read-machines";

export async function createMachine(_container: Container, scope: Scope, body: Machine): Promise<MachineReply> {
  const id = newId("machine");
  return withOrganisation(scope, async (tx) => {
    const row = await insertMachine(tx, scope, { id, body });
    await recordAudit(tx, scope, { action: "machine.create", subject: id, detail: { name: body.name } });
    return describeMachine(row);
  });
}

/** Lays the patch over the machine; `null` takes an optional value away. The whole must be a valid machine again. */
function applyPatch(body: Machine, patch: Record<string, unknown>): Machine {
  if (patch.kind !== undefined && patch.kind !== body.kind) {
    throw new AppError("unprocessable", "The kind of a machine cannot change. Make another machine.", {
      places: [{ path: "kind", message: `is ${body.kind}` }],
    });
  }
  const merged = Object.entries({ ...body, ...patch }).filter(([, value]) => value !== null);
  return MachineInput.parse(Object.fromEntries(merged));
}

/** The new machine, with null for what the old one had and the new one has not. */
function fillRemoved(before: Machine, after: Machine): Record<string, unknown> {
  return { ...Object.fromEntries(Object.keys(before).map((key) => [key, null])), ...after };
}

/** Logs already built keep the machine as it was; they are read again only when someone asks. */
export async function updateMachine(
  container: Container,
  scope: Scope,
  input: { machineId: string; patch: Record<string, unknown> },
): Promise<MachineReply> {
  return withOrganisation(scope, async (tx) => {
    const known = await getMachineOrThrow(tx, scope, input.machineId);
    const body = applyPatch(known.body, input.patch);
    await updateMachineRow(tx, scope, { machineId: known.id, body, at: container.clock.now() });
    const detail = { name: known.name, ...describeChanges(known.body, fillRemoved(known.body, body)) };
    await recordAudit(tx, scope, { action: "machine.update", subject: known.id, detail });
    return describeMachine(await getMachineOrThrow(tx, scope, known.id));
  });
}

/** A machine that logs were placed with is kept (409) unless `force`; the logs keep their own copy of it. */
export async function deleteMachine(
  _container: Container,
  scope: Scope,
  input: { machineId: string; force: boolean },
): Promise<void> {
  await withOrganisation(scope, async (tx) => {
    const { id, name } = await getMachineOrThrow(tx, scope, input.machineId);
    const logCount = await countLogsOfMachine(tx, scope, id);
    if (logCount > 0 && !input.force) {
      throw new AppError(
        "conflict",
        `${logCount} logs were placed with this machine. Repeat with force=1 to delete it.`,
        {
          detailCode: "machine_has_logs",
          extra: { logCount },
        },
      );
    }
    await forgetMachineInLogs(tx, scope, id);
    await deleteMachineRow(tx, scope, id);
    await recordAudit(tx, scope, { action: "machine.delete", subject: id, detail: { name, logCount } });
  });
}
