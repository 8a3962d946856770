import { parseBody, parseQuery } from "@/app/_server/parse-body";
import { reply, replyNothing } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ForceQuery } from "@/lib/schemas/listing";
import { MachinePatch, MachineReply } from "@/lib/schemas/machines";
import { deleteMachine, updateMachine } from "@/lib/server/machines/change-machines";
import { readMachine } from "@/lib/server/machines/read-machines";

export const GET = withScope<"machineId">("machines.read", async ({ container, scope, params }) =>
  reply(MachineReply, await readMachine(container, scope, params.machineId)),
);

export const PATCH = withScope<"machineId">("machines.write", async ({ container, scope, params, request }) => {
  const patch = await parseBody(MachinePatch, request);
  return reply(MachineReply, await updateMachine(container, scope, { machineId: params.machineId, patch }));
});

export const DELETE = withScope<"machineId">("machines.write", async ({ container, scope, params, url }) => {
  await deleteMachine(container, scope, { machineId: params.machineId, ...parseQuery(ForceQuery, url) });
  return replyNothing();
});

export { refuseMethod as POST, refuseMethod as PUT } from "@/app/_server/refuse-method";
