import type { Metadata } from "next";
import { requireScope } from "@/app/_server/require-scope";
import { MachineForm } from "@/components/machines/machine-form";
import { MachineFromLog } from "@/components/machines/machine-from-log";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";

export const metadata: Metadata = { title: "New machine" };

interface NewMachineProps {
  params: Promise<{ org: string }>;
  /** `log`: begin with what that log's file says about its machine; `layer`: of the log of that name in it. */
  searchParams: Promise<{ kind?: string; log?: string; layer?: string }>;
}

export default async function NewMachineRoute({ params, searchParams }: NewMachineProps) {
  const [{ org }, { kind, log, layer }] = await Promise.all([params, searchParams]);
  const { organisation } = await requireScope(org, "machines.write");
  const isCombine = kind === "combine";
  return (
    <PageBody>
      <PageHeading title={isCombine ? "New combine" : "New drill or planter"} />
      {log ? (
        <MachineFromLog slug={organisation.slug} logId={log} layer={layer ?? null} />
      ) : (
        <MachineForm
          slug={organisation.slug}
          machineId={null}
          start={
            isCombine ? { kind: "combine", name: "" } : { kind: "seeder", name: "", hitch: "rigid", antennaRightM: 0 }
          }
        />
      )}
    </PageBody>
  );
}
