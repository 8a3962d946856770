"use client";

import { useMachines } from "@/components/hooks/use-machines";
import { MachineForm } from "@/components/machines/machine-form";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { PageHeading } from "@/components/ui/page-heading";
import { describeFailure } from "@/lib/api/api-problem";

/** One known machine, open for changes. */
export function MachinePage({ slug, machineId }: { slug: string; machineId: string }) {
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
  const { id: _id, createdAt: _createdAt, updatedAt: _updatedAt, ...body } = machine;
  return (
    <>
      <PageHeading title={machine.name} />
      <MachineForm slug={slug} machineId={machineId} start={body} />
    </>
  );
}
