import type { Metadata } from "next";
import { requireScope } from "@/app/_server/require-scope";
import { MachineForm } from "@/components/machines/machine-form";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";

export const metadata: Metadata = { title: "New machine" };

interface NewMachineProps {
  params: Promise<{ org: string }>;
  searchParams: Promise<{ kind?: string }>;
}

export default async function NewMachineRoute({ params, searchParams }: NewMachineProps) {
  const [{ org }, { kind }] = await Promise.all([params, searchParams]);
  const { organisation } = await requireScope(org, "machines.write");
  const isCombine = kind === "combine";
  return (
    <PageBody>
      <PageHeading title={isCombine ? "New combine" : "New drill or planter"} />
      <MachineForm
        slug={organisation.slug}
        machineId={null}
        start={
          isCombine ? { kind: "combine", name: "" } : { kind: "seeder", name: "", hitch: "rigid", antennaRightM: 0 }
        }
      />
    </PageBody>
  );
}
