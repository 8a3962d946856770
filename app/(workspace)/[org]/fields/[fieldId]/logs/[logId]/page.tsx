import type { Metadata } from "next";
import { container } from "@/app/_server/container";
import { orNotFound, requireScope } from "@/app/_server/require-scope";
import { PageBody } from "@/components/ui/page-body";
import { LogProgress } from "@/components/upload/log-progress";
import { getLog } from "@/lib/server/logs/read-logs";

export const metadata: Metadata = { title: "Log" };

interface LogRouteProps {
  params: Promise<{ org: string; fieldId: string; logId: string }>;
}

export default async function LogRoute({ params }: LogRouteProps) {
  const { org, fieldId, logId } = await params;
  const { scope, organisation } = await requireScope(org);
  await orNotFound(getLog(container(), scope, logId));
  return (
    <PageBody>
      <LogProgress
        logId={logId}
        fieldId={fieldId}
        fieldPath={`/${organisation.slug}/fields/${fieldId}`}
        role={scope.role}
      />
    </PageBody>
  );
}
