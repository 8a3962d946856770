"use client";

import Link from "next/link";
import { useMemo } from "react";
import { useDeleteMachine, useMachinePages } from "@/components/hooks/use-machines";
import { Button, buttonClass } from "@/components/ui/button";
import { DataTable, type DataColumn } from "@/components/ui/data-table";
import { ConfirmDialog } from "@/components/ui/dialog";
import { EmptyState } from "@/components/ui/empty-state";
import { useWithoutRemoved } from "@/components/removals/use-removals";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { Quantity } from "@/components/units/quantity";
import { useUnits } from "@/components/units/use-units";
import { describeFailure } from "@/lib/api/api-problem";
import type { MachineReply } from "@/lib/schemas/machines";

const KIND_WORDS: Record<MachineReply["kind"], string> = { seeder: "Drill or planter", combine: "Combine" };

/** Width over ground: rows times spacing, or the header. */
function widthM(machine: MachineReply): number {
  return machine.kind === "seeder" ? machine.rowCount * machine.rowSpacingM : machine.headerWidthM;
}

export function MachinesPage({ slug, mayWrite }: { slug: string; mayWrite: boolean }) {
  const machines = useMachinePages();
  const items = useWithoutRemoved(machines.items);
  const remove = useDeleteMachine();
  const { parts, exact } = useUnits();
  const columns = useMemo<DataColumn<MachineReply>[]>(() => {
    const lengthUnit = parts(1, "m").unit;
    const rulerUnit = parts(1, "m", "rowSpacing").unit;
    return [
      {
        id: "name",
        header: "Machine",
        value: (machine) => machine.name,
        cell: (machine) => (
          <Link
            href={`/${slug}/machines/${machine.id}`}
            className="inline-flex min-h-11 items-center font-semibold md:min-h-8"
          >
            {machine.name}
          </Link>
        ),
      },
      { id: "kind", header: "Kind", value: (machine) => KIND_WORDS[machine.kind] },
      {
        id: "rows",
        header: "Rows",
        numeric: true,
        value: (machine) => (machine.kind === "seeder" ? machine.rowCount : machine.headerRows),
      },
      {
        id: "spacing",
        header: `Row spacing (${rulerUnit})`,
        numeric: true,
        value: (machine) => (machine.kind === "seeder" ? exact(machine.rowSpacingM, "m", "rowSpacing") : undefined),
        cell: (machine) =>
          machine.kind === "seeder" ? <Quantity value={machine.rowSpacingM} unit="m" channel="rowSpacing" /> : "–",
      },
      {
        id: "width",
        header: `Width (${lengthUnit})`,
        numeric: true,
        value: (machine) => exact(widthM(machine), "m"),
        cell: (machine) => <Quantity value={widthM(machine)} unit="m" />,
      },
      { id: "hitch", header: "Hitch", value: (machine) => (machine.kind === "seeder" ? machine.hitch : undefined) },
    ];
  }, [parts, exact, slug]);
  if (machines.isPending) return <Loading what="the machines" />;
  if (!items)
    return (
      <Notice state="act" urgent>
        {describeFailure(machines.error)}
      </Notice>
    );
  if (items.length === 0) return <NoMachines slug={slug} mayWrite={mayWrite} />;
  return (
    <div className="space-y-3">
      <DataTable
        caption="Machines of this organisation"
        rows={items}
        more={machines.more}
        columns={columns}
        rowId={(machine) => machine.id}
        fileName="machines"
        initialSort={{ id: "name", desc: false }}
        actions={
          mayWrite
            ? (machine) => (
                <ConfirmDialog
                  trigger={<Button kind="quiet">Delete</Button>}
                  title={`Delete ${machine.name}?`}
                  confirmWords="Delete the machine"
                  onConfirm={() => remove(machine)}
                >
                  <p>
                    Logs already placed with it keep their own copy of it and do not change. You can undo it for half a
                    minute, then not any more.
                  </p>
                </ConfirmDialog>
              )
            : undefined
        }
      />
    </div>
  );
}

function NoMachines({ slug, mayWrite }: { slug: string; mayWrite: boolean }) {
  return (
    <EmptyState
      title="No machine yet"
      action={
        mayWrite ? (
          <Link href={`/${slug}/machines/new?kind=seeder`} className={buttonClass("primary")}>
            Describe a drill or planter
          </Link>
        ) : null
      }
    >
      <p>
        A log says where the antenna was. To put every row on the ground, Coulterbook must know where on the machine the
        rows are: how many, how far apart, how far behind the antenna.
      </p>
    </EmptyState>
  );
}
