"use client";

import Link from "next/link";
import { useColumns, type useLogActions } from "@/components/hooks/use-logs";
import { Button, buttonClass } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { can, type Role } from "@/lib/access/permissions";
import { logOriginalPath } from "@/lib/api/client";
import type { Log } from "@/lib/schemas/logs";

/** Ends of a reading that say nothing against the file: it may be read the next time. */
const WORTH_ANOTHER_TRY = new Set(["cancelled", "interrupted", "reader-broke", "took-too-long", "out-of-memory"]);

interface LogFailureProps {
  log: Log;
  fieldPath: string;
  role: Role;
  actions: ReturnType<typeof useLogActions>;
}

/** Why a log could not be read, and the one thing that helps. */
export function LogFailure({ log, fieldPath, role, actions }: LogFailureProps) {
  const place = [
    log.error?.line === undefined ? null : `line ${log.error.line}`,
    log.error?.column === undefined ? null : `column ${log.error.column}`,
  ].filter((part) => part !== null);
  return (
    <div className="space-y-3">
      <Notice state="act" urgent title="The log could not be read">
        <p>{log.error?.message ?? "No reason was kept."}</p>
        {place.length > 0 ? <p className="tabular">At {place.join(", ")}.</p> : null}
      </Notice>
      <div className="flex flex-wrap gap-2">
        <WayOut log={log} fieldPath={fieldPath} role={role} actions={actions} />
        <a href={logOriginalPath(log.id)} download className={buttonClass("quiet")}>
          Download the original
        </a>
      </div>
    </div>
  );
}

function WayOut({ log, fieldPath, role, actions }: LogFailureProps) {
  const columns = useColumns(log.id);
  const again = (kind: "primary" | "quiet") => (
    <Button kind={kind} onClick={() => actions.retry.mutate(log.id)}>
      Read it again
    </Button>
  );
  if (!can(role, "logs.map")) return null;
  if (WORTH_ANOTHER_TRY.has(log.error?.code ?? "")) return again("primary");
  if (columns.isPending) return null;
  // Columns were found: what they mean, or which machine it was, can be put right there.
  if (columns.isSuccess) {
    return (
      <>
        <Link href={`${fieldPath}/logs/${log.id}/columns`} className={buttonClass("primary")}>
          Look at the columns
        </Link>
        {again("quiet")}
      </>
    );
  }
  return (
    <Link href={`${fieldPath}/logs`} className={buttonClass("primary")}>
      Choose another file
    </Link>
  );
}
