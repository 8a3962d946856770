import type { Metadata } from "next";
import { requireScope } from "@/app/_server/require-scope";
import { MachinePage } from "@/components/machines/machine-page";
import { PageBody } from "@/components/ui/page-body";
import { RoleBars } from "@/components/ui/role-bars";
import { can } from "@/lib/access/permissions";

export const metadata: Metadata = { title: "Machine" };

export default async function MachineRoute({ params }: { params: Promise<{ org: string; machineId: string }> }) {
  const { org, machineId } = await params;
  const { scope, organisation } = await requireScope(org);
  if (!can(scope.role, "machines.read")) return <RoleBars role={scope.role} toDo="see the machines" />;
  return (
    <PageBody>
      <MachinePage slug={organisation.slug} machineId={machineId} mayWrite={can(scope.role, "machines.write")} />
    </PageBody>
  );
}
