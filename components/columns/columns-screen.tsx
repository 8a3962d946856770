"use client";

import { useRouter, useSearchParams } from "next/navigation";
import { ColumnsForm } from "@/components/columns/columns-form";
import { useColumns, useLog, usePutMapping } from "@/components/hooks/use-logs";
import { useMachines } from "@/components/hooks/use-machines";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { can, type Role } from "@/lib/access/permissions";
import { describeFailure } from "@/lib/api/api-problem";

export interface ColumnsScreenProps {
  /** `/org/fields/fld_…/logs/log_…`. */
  logPath: string;
  logId: string;
  role: Role;
}

/** Asks for what was found in the file, and sends back what a person says it means. */
export function ColumnsScreen({ logPath, logId, role }: ColumnsScreenProps) {
  const router = useRouter();
  const madeMachineId = useSearchParams().get("machine");
  const log = useLog(logId);
  const columns = useColumns(logId);
  const machines = useMachines(can(role, "machines.read"));
  const save = usePutMapping(logId);
  const known = can(role, "machines.read") ? machines.data?.items : [];
  const failed = [log, columns, machines].find((query) => query.isError);
  if (failed) {
    return (
      <Notice state="act" urgent>
        {describeFailure(failed.error)}
      </Notice>
    );
  }
  if (!log.data || !columns.data || !known) return <Loading what="the columns of the file" />;
  return (
    <ColumnsForm
      log={log.data}
      found={columns.data}
      machines={known}
      machineId={madeMachineId ?? log.data.machineId}
      makeMachineHref={can(role, "machines.write") ? `/${logPath.split("/")[1]}/machines/new?log=${logId}` : null}
      mayChange={can(role, "logs.map")}
      pending={save.isPending || save.isSuccess}
      failure={save.error}
      onSave={(mapping, machineId) => save.mutate({ mapping, machineId }, { onSuccess: () => router.push(logPath) })}
    />
  );
}
