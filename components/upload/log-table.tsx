"use client";

import Link from "next/link";
import { useMemo } from "react";
import { ExportMenu } from "@/components/export/export-menu";
import { useLogActions } from "@/components/hooks/use-logs";
import { useMachines } from "@/components/hooks/use-machines";
import type { MorePages } from "@/components/hooks/use-pages";
import { buttonClass } from "@/components/ui/button";
import { DataTable, type DataColumn } from "@/components/ui/data-table";
import { formatBytes, formatDay, formatMoment } from "@/components/ui/format-date";
import { Notice } from "@/components/ui/notice";
import { ProgressBar } from "@/components/ui/progress-bar";
import { StateWord } from "@/components/ui/state-mark";
import { LogMenu } from "@/components/upload/log-menu";
import { describeLogStatus, isWorking } from "@/components/upload/log-state";
import { can, type Role } from "@/lib/access/permissions";
import { describeFailure } from "@/lib/api/api-problem";
import type { Log } from "@/lib/schemas/logs";

const KIND_WORDS: Record<Log["kind"], string> = { seeding: "seeding", harvest: "harvest", other: "other" };

export interface LogTableProps {
  logs: Log[];
  fieldId: string;
  /** `/org/fields/fld_…`. */
  fieldPath: string;
  role: Role;
  more?: MorePages;
}

/** The logs of a field, newest first. */
export function LogTable({ logs, fieldId, fieldPath, role, more }: LogTableProps) {
  const machines = useMachines(can(role, "machines.read"));
  const actions = useLogActions(fieldId);
  const failure = actions.cancel.error ?? actions.retry.error;
  const columns = useMemo<DataColumn<Log>[]>(() => {
    const nameOf = new Map(machines.data?.items.map((machine) => [machine.id, machine.name]));
    return [
      {
        id: "name",
        header: "Log",
        value: (log) => log.name,
        cell: (log) => (
          <Link href={logHref(log, fieldPath)} className="inline-flex min-h-11 items-center font-semibold md:min-h-8">
            {log.name}
          </Link>
        ),
      },
      {
        id: "state",
        header: "State",
        value: (log) => describeLogStatus(log.status).word,
        cell: (log) => <LogState log={log} />,
      },
      { id: "kind", header: "Kind", value: (log) => KIND_WORDS[log.kind] },
      { id: "machine", header: "Machine", value: (log) => nameOf.get(log.machineId ?? "") },
      {
        id: "started",
        header: "Driven",
        value: (log) => log.startedAt ?? undefined,
        cell: (log) => formatDay(log.startedAt),
      },
      { id: "records", header: "Records", numeric: true, value: (log) => log.counts.records, wideOnly: true },
      {
        id: "size",
        header: "Size (bytes)",
        numeric: true,
        value: (log) => log.fileBytes,
        cell: (log) => formatBytes(log.fileBytes),
        wideOnly: true,
      },
      { id: "taken", header: "Taken in", value: (log) => log.createdAt, cell: (log) => formatMoment(log.createdAt) },
    ];
  }, [fieldPath, machines.data]);
  return (
    <div className="space-y-3">
      {failure ? (
        <Notice state="act" urgent>
          {describeFailure(failure)}
        </Notice>
      ) : null}
      <DataTable
        caption="Logs of this field"
        rows={logs}
        columns={columns}
        rowId={(log) => log.id}
        fileName="logs"
        initialSort={{ id: "taken", desc: true }}
        more={more}
        actions={(log) => (
          <>
            <Link href={logHref(log, fieldPath)} className={buttonClass("plain")}>
              {openWords(log)}
            </Link>
            {log.status === "ready" && can(role, "logs.export") ? <ExportMenu log={log} /> : null}
            <LogMenu log={log} fieldPath={fieldPath} role={role} actions={actions} />
          </>
        )}
      />
    </div>
  );
}

/** Where a log wants one to be: its rows, its columns, or its progress. */
export function logHref(log: Log, fieldPath: string): string {
  if (log.status === "ready") return `${fieldPath}/rows?log=${log.id}`;
  const path = `${fieldPath}/logs/${log.id}`;
  return log.status === "needs-mapping" ? `${path}/columns` : path;
}

function openWords(log: Log): string {
  if (log.status === "ready") return "Rows";
  return log.status === "needs-mapping" ? "Columns" : "See";
}

function LogState({ log }: { log: Log }) {
  const { mark, word } = describeLogStatus(log.status);
  if (!isWorking(log.status)) return <StateWord state={mark}>{word}</StateWord>;
  return (
    <span className="inline-block w-36 space-y-1">
      <span className="block">{log.stage || word}</span>
      <ProgressBar share={log.progress} label={`${log.name}: ${log.stage || word}`} />
    </span>
  );
}
