"use client";

import { useMachines } from "@/components/hooks/use-machines";
import { MachineForm } from "@/components/machines/machine-form";
import type { DraftMachine } from "@/components/machines/toolbar-drawing";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { PageHeading } from "@/components/ui/page-heading";
import { describeFailure } from "@/lib/api/api-problem";
import type { MachineReply } from "@/lib/schemas/machines";

/** What a person described, without what the server wrote down about it. */
function withoutRecord(machine: MachineReply): DraftMachine {
  const kept = Object.entries(machine).filter(([key]) => !["id", "createdAt", "updatedAt"].includes(key));
  return { ...Object.fromEntries(kept), kind: machine.kind };
}

export interface MachinePageProps {
  slug: string;
  machineId: string;
  mayWrite: boolean;
}

/** One known machine, open for changes to those who may. */
export function MachinePage({ slug, machineId, mayWrite }: MachinePageProps) {
  const machines = useMachines();
  if (machines.isPending) return <Loading what="the machine" />;
  if (machines.isError)
    return (
      <Notice state="act" urgent>
        {describeFailure(machines.error)}
      </Notice>
    );
  const machine = machines.data.items.find((candidate) => candidate.id === machineId);
  if (!machine) return <Notice state="act">This machine is not here. It may have been deleted.</Notice>;
  return (
    <>
      <PageHeading title={machine.name} />
      <MachineForm slug={slug} machineId={machineId} start={withoutRecord(machine)} mayWrite={mayWrite} />
    </>
  );
}
