import type { Metadata } from "next";
import { container } from "@/app/_server/container";
import { orNotFound, requireScope } from "@/app/_server/require-scope";
import { MachinePage } from "@/components/machines/machine-page";
import { PageBody } from "@/components/ui/page-body";
import { can } from "@/lib/access/permissions";
import { readMachine } from "@/lib/server/machines/read-machines";

export const metadata: Metadata = { title: "Machine" };

export default async function MachineRoute({ params }: { params: Promise<{ org: string; machineId: string }> }) {
  const { org, machineId } = await params;
  const { scope, organisation } = await requireScope(org, "machines.read");
  await orNotFound(readMachine(container(), scope, machineId));
  return (
    <PageBody>
      <MachinePage slug={organisation.slug} machineId={machineId} mayWrite={can(scope.role, "machines.write")} />
    </PageBody>
  );
}
