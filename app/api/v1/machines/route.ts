import { parseBody, parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { MachineInput } from "@/lib/machines/machine";
import { ListQuery } from "@/lib/schemas/listing";
import { MachineList, MachineReply } from "@/lib/schemas/machines";
import { createMachine } from "@/lib/server/machines/change-machines";
import { listMachines } from "@/lib/server/machines/read-machines";

export const GET = withScope("machines.read", async ({ container, scope, url }) =>
  reply(MachineList, await listMachines(container, scope, parseQuery(ListQuery, url))),
);

export const POST = withScope("machines.write", async ({ container, scope, request }) => {
  const machine = await createMachine(container, scope, await parseBody(MachineInput, request));
  return reply(MachineReply, machine, { status: 201, headers: { location: `/api/v1/machines/${machine.id}` } });
});

export { refuseMethod as PUT, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
