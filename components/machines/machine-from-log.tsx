"use client";

import { useColumns, useLog } from "@/components/hooks/use-logs";
import { viewLayer } from "@/components/columns/layer-picker";
import { MachineForm } from "@/components/machines/machine-form";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { describeFailure } from "@/lib/api/api-problem";
import { draftSeeder } from "@/lib/machines/describe-device";

export interface MachineFromLogProps {
  slug: string;
  logId: string;
  /** Which of several logs in the file describes it. */
  layer: string | null;
}

/** A new machine that begins with what a log's file says about it; saved, it is chosen for that log. */
export function MachineFromLog({ slug, logId, layer }: MachineFromLogProps) {
  const log = useLog(logId);
  const columns = useColumns(logId);
  const failed = [log, columns].find((query) => query.isError);
  if (failed) {
    return (
      <Notice state="act" urgent>
        {describeFailure(failed.error)}
      </Notice>
    );
  }
  if (!log.data || !columns.data) return <Loading what="what the file says about its machine" />;
  const { device } = viewLayer(columns.data, layer);
  const start = device
    ? draftSeeder(device)
    : ({ kind: "seeder", name: "", hitch: "rigid", antennaRightM: 0 } as const);
  return (
    <div className="space-y-6">
      <Notice state={device ? "fine" : "look"}>
        {device
          ? "Rows and their places are those of the file. Where the antenna sits it does not say: measure that, and look the rest up in the manual."
          : "This file does not describe its machine."}
      </Notice>
      <MachineForm
        slug={slug}
        machineId={null}
        start={start}
        returnTo={`/${slug}/fields/${log.data.fieldId}/logs/${logId}/columns`}
      />
    </div>
  );
}
