"use client";

import { useLogPages } from "@/components/hooks/use-logs";
import { EmptyState } from "@/components/ui/empty-state";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { useWithoutRemoved } from "@/components/removals/use-removals";
import { LogTable } from "@/components/upload/log-table";
import { LogUpload } from "@/components/upload/log-upload";
import { can, type Role } from "@/lib/access/permissions";
import { describeFailure } from "@/lib/api/api-problem";
import type { Log } from "@/lib/schemas/logs";

export interface LogsPageProps {
  fieldId: string;
  fieldPath: string;
  role: Role;
  exampleHref: string | null;
}

/** The machine of the newest seeding log that has one. */
export function lastSeedingMachine(logs: readonly Log[]): string | null {
  return logs.find((log) => log.kind === "seeding" && log.machineId !== null)?.machineId ?? null;
}

export function LogsPage({ fieldId, fieldPath, role, exampleHref }: LogsPageProps) {
  const logs = useLogPages(fieldId);
  const items = useWithoutRemoved(logs.items);
  return (
    <div className="space-y-8">
      {can(role, "logs.upload") ? (
        <LogUpload
          fieldId={fieldId}
          logsPath={`${fieldPath}/logs`}
          exampleHref={exampleHref}
          lastMachineId={lastSeedingMachine(items ?? [])}
        />
      ) : null}
      {logs.isPending ? <Loading what="the logs" /> : null}
      {logs.error ? (
        <Notice state="act" urgent>
          {describeFailure(logs.error)}
        </Notice>
      ) : null}
      {items?.length === 0 ? (
        <EmptyState title="No log in this field yet">
          <p>
            A log is the file the drill or the combine wrote while it worked: where it was, several times a second, and
            what each row did there. The original is kept as it is.
          </p>
        </EmptyState>
      ) : null}
      {items && items.length > 0 ? (
        <LogTable logs={items} more={logs.more} fieldId={fieldId} fieldPath={fieldPath} role={role} />
      ) : null}
    </div>
  );
}
