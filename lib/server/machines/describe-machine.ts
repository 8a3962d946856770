import "server-only";
import type { MachineRow } from "@/db/queries/machines";
import type { MachineReply } from "@/lib/schemas/machines";

/** A machine as the API shows it. */
export function describeMachine(row: MachineRow): MachineReply {
  return {
    ...row.body,
    id: row.id,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
  };
}
