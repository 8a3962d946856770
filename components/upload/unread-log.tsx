import Link from "next/link";
import { buttonClass } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/empty-state";
import { describeLogStatus } from "@/components/upload/log-state";
import type { Log } from "@/lib/schemas/logs";

export interface UnreadLogProps {
  log: Pick<Log, "id" | "name" | "status">;
  /** `/org/fields/fld_…/logs`. */
  logsHref: string;
}

/** In the place of the rows of a log that has none yet: never another log's rows in its name. */
export function UnreadLog({ log, logsHref }: UnreadLogProps) {
  return (
    <EmptyState
      title="This log is not read yet"
      action={
        <Link href={`${logsHref}/${log.id}`} className={buttonClass("primary")}>
          See how it stands
        </Link>
      }
    >
      <p>
        {log.name}: {describeLogStatus(log.status).word}.
      </p>
    </EmptyState>
  );
}
