"use client";

import Link from "next/link";
import { buttonClass } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { useUnits } from "@/components/units/use-units";
import { compareDevice } from "@/lib/machines/compare-device";
import { lengthsIn, sayDevice, sayDifference } from "@/lib/machines/say-device";
import type { LogColumns } from "@/lib/schemas/logs";
import type { MachineReply } from "@/lib/schemas/machines";

export interface DeviceCardProps {
  device: NonNullable<LogColumns["device"]>;
  /** The machine chosen for the log so far. */
  machine: MachineReply | null;
  /** Where a machine can be made from the description; null for those who may not. */
  makeHref: string | null;
}

/** What the file says about the machine that made it, beside the machine chosen for it. */
export function DeviceCard({ device, machine, makeHref }: DeviceCardProps) {
  const { system } = useUnits();
  const say = lengthsIn(system);
  const differences = machine ? compareDevice(device, machine) : [];
  return (
    <section className="sheet space-y-3 p-4" aria-labelledby="device-title">
      <h2 id="device-title" className="text-section">
        The machine, as the file describes it
      </h2>
      <p className="max-w-prose break-words">{sayDevice(device, say)}</p>
      {machine && differences.length === 0 ? (
        <Notice state="fine">{machine.name} has its rows in the same places.</Notice>
      ) : null}
      {machine && differences.length > 0 ? (
        <Notice state="look" title={`${machine.name} is another machine than that`}>
          {differences.map((difference) => sayDifference(difference, say)).join(" ")} Choose the machine that made the
          log below, or make one from the file.
        </Notice>
      ) : null}
      {machine && differences.length === 0 ? null : makeHref === null ? (
        <p className="text-ink-soft">An owner or agronomist can make a machine from this.</p>
      ) : (
        <Link href={makeHref} className={buttonClass("quiet")}>
          Make a machine from this
        </Link>
      )}
    </section>
  );
}
