"use client";

import { useQueryClient } from "@tanstack/react-query";
import Link from "next/link";
import { useRouter } from "next/navigation";
import { useEffect } from "react";
import { queryKeys } from "@/components/hooks/query-keys";
import { useLogEvents } from "@/components/hooks/use-log-events";
import { useLog, useLogActions } from "@/components/hooks/use-logs";
import { Button, buttonClass } from "@/components/ui/button";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { PageHeading } from "@/components/ui/page-heading";
import { ProgressBar } from "@/components/ui/progress-bar";
import { LogFailure } from "@/components/upload/log-failure";
import { LogFacts } from "@/components/upload/log-facts";
import { LogSteps } from "@/components/upload/log-steps";
import { RecipeWords } from "@/components/upload/recipe-words";
import { isWorking } from "@/components/upload/log-state";
import { OutsideField, outsideFieldNote } from "@/components/upload/outside-field";
import { can, type Role } from "@/lib/access/permissions";
import { describeFailure } from "@/lib/api/api-problem";
import type { Log } from "@/lib/schemas/logs";

export interface LogProgressProps {
  logId: string;
  fieldId: string;
  fieldPath: string;
  role: Role;
}

/** From the last byte sent to the verdict: what is being done, how far it is, and what to do when it stops. */
export function LogProgress({ logId, fieldId, fieldPath, role }: LogProgressProps) {
  const router = useRouter();
  const query = useLog(logId);
  const log = query.data;
  useLogEvents(log);
  const client = useQueryClient();
  const status = log?.status;
  // The field's list of logs was fetched before this log came so far; pages that choose a log from it must not miss it.
  useEffect(() => {
    if (status === "ready" || status === "failed") void client.invalidateQueries({ queryKey: queryKeys.fields });
  }, [client, status]);
  const asksForMeaning = log?.status === "needs-mapping" && can(role, "logs.map");
  useEffect(() => {
    if (asksForMeaning) router.replace(`${fieldPath}/logs/${logId}/columns`);
  }, [asksForMeaning, fieldPath, logId, router]);
  if (query.isPending) return <Loading what="the log" />;
  if (query.isError || !log) {
    return (
      <Notice state="act" urgent>
        {describeFailure(query.error)}
      </Notice>
    );
  }
  return (
    <div className="space-y-6">
      <PageHeading title={log.name} lead={log.fileName === log.name ? undefined : log.fileName} />
      <div className="max-w-2xl space-y-6">
        <LogSteps status={log.status} />
        {log.status === "ready" ? (
          <OutsideField log={log} fieldPath={fieldPath} mayMove={can(role, "logs.map")} />
        ) : null}
        <Outcome log={log} fieldId={fieldId} fieldPath={fieldPath} role={role} />
        <LogFacts log={log} />
      </div>
    </div>
  );
}

interface OutcomeProps {
  log: Log;
  fieldId: string;
  fieldPath: string;
  role: Role;
}

function Outcome({ log, fieldId, fieldPath, role }: OutcomeProps) {
  const actions = useLogActions(fieldId);
  const mayUpload = can(role, "logs.upload");
  if (isWorking(log.status)) {
    return (
      <div className="sheet space-y-3 p-4">
        <p role="status" className="text-section">
          {log.stage || "Waiting its turn"}
        </p>
        <ProgressBar share={log.progress} label={log.stage || "Waiting its turn"} />
        <p className="tabular text-table text-ink-soft">
          {Math.round(log.progress * 100)} %. You may leave this page; the work goes on.
        </p>
        {mayUpload ? <Button onClick={() => actions.cancel.mutate(log.id)}>Stop reading</Button> : null}
      </div>
    );
  }
  if (log.status === "ready") {
    const columnsHref = can(role, "logs.map") ? `${fieldPath}/logs/${log.id}/columns` : null;
    return (
      <div className="space-y-3">
        <RecipeWords log={log} columnsHref={columnsHref} />
        <p className="flex flex-wrap gap-2">
          <Link
            href={`${fieldPath}/rows?log=${log.id}`}
            className={buttonClass(outsideFieldNote(log) ? "plain" : "primary")}
          >
            {log.kind === "harvest" ? "See the rows" : "See the verdict"}
          </Link>
          {columnsHref ? (
            <Link href={columnsHref} className={buttonClass("quiet")}>
              What the columns mean
            </Link>
          ) : null}
          <Link href={`${fieldPath}/logs/${log.id}/cleaning`} className={buttonClass("quiet")}>
            Cleaning rules
          </Link>
        </p>
      </div>
    );
  }
  if (log.status === "failed") return <LogFailure log={log} fieldPath={fieldPath} role={role} actions={actions} />;
  return <Notice state="look">The file is here. Somebody who may must say what its columns mean.</Notice>;
}
