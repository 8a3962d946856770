import { MachineInput } from "@/lib/machines/machine";
import type { Operation } from "@/lib/openapi/operation";
import { ForceQuery, ListQuery } from "@/lib/schemas/listing";
import { MachineList, MachinePatch, MachineReply } from "@/lib/schemas/machines";

const tag = "Machines";

export const machineOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/machines",
    tag,
    permission: "machines.read",
    summary: "Machines by name",
    query: ListQuery,
    replies: [{ status: 200, description: "A page of machines", schema: MachineList }],
  },
  {
    method: "POST",
    path: "/api/v1/machines",
    tag,
    permission: "machines.write",
    summary: "Add a seeder or a combine",
    body: MachineInput,
    replies: [{ status: 201, description: "The machine; its address in Location", schema: MachineReply }],
  },
  {
    method: "GET",
    path: "/api/v1/machines/{machineId}",
    tag,
    permission: "machines.read",
    summary: "One machine",
    replies: [{ status: 200, description: "The machine", schema: MachineReply }],
  },
  {
    method: "PATCH",
    path: "/api/v1/machines/{machineId}",
    tag,
    permission: "machines.write",
    summary: "Change a machine",
    description:
      "What is not named stays, `null` takes an optional value away; the kind cannot change. Logs already built keep " +
      "the machine as it was.",
    body: MachinePatch,
    replies: [{ status: 200, description: "The machine as it is now", schema: MachineReply }],
  },
  {
    method: "DELETE",
    path: "/api/v1/machines/{machineId}",
    tag,
    permission: "machines.write",
    summary: "Delete a machine",
    description: "Kept (409) while logs were placed with it, unless `force=1`; the logs keep their copy of it.",
    query: ForceQuery,
    replies: [{ status: 204, description: "Gone" }],
    errors: ["conflict"],
  },
];
