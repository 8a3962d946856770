import type { Metadata } from "next";
import { readBasemap } from "@/app/_server/basemap";
import { container } from "@/app/_server/container";
import { orNotFound, requireScope } from "@/app/_server/require-scope";
import { FieldBook } from "@/components/field-book/field-book";
import { PageBody } from "@/components/ui/page-body";
import { UnreadLog } from "@/components/upload/unread-log";
import type { Log } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import { getLog } from "@/lib/server/logs/read-logs";

export const metadata: Metadata = { title: "Rows" };

interface RowsPageProps {
  params: Promise<{ org: string; fieldId: string }>;
  searchParams: Promise<{ log?: string | string[] }>;
}

/** The log that the address asks for, if it has nothing to show yet. An unknown one is not here. */
async function findUnreadLog(scope: Scope, logId: string | string[] | undefined): Promise<Log | null> {
  if (typeof logId !== "string") return null;
  const log = await orNotFound(getLog(container(), scope, logId));
  return log.status === "ready" ? null : log;
}

/** The chapter "Rows". Whether the field may be seen is decided by the queries behind it. */
export default async function RowsPage({ params, searchParams }: RowsPageProps) {
  const { org, fieldId } = await params;
  const { scope } = await requireScope(org);
  const basemap = readBasemap();
  const logsHref = `/${org}/fields/${fieldId}/logs`;
  const unread = await findUnreadLog(scope, (await searchParams).log);
  if (unread) {
    return (
      <PageBody>
        <UnreadLog log={unread} logsHref={logsHref} />
      </PageBody>
    );
  }
  return <FieldBook fieldId={fieldId} logsHref={logsHref} basemap={basemap} role={scope.role} />;
}
