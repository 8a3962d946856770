import type { Metadata } from "next";
import Link from "next/link";
import { container } from "@/app/_server/container";
import { orNotFound, requireScope } from "@/app/_server/require-scope";
import { ColumnsScreen } from "@/components/columns/columns-screen";
import { buttonClass } from "@/components/ui/button";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { can } from "@/lib/access/permissions";
import { getLog } from "@/lib/server/logs/read-logs";

export const metadata: Metadata = { title: "What the columns mean" };

interface ColumnsRouteProps {
  params: Promise<{ org: string; fieldId: string; logId: string }>;
}

export default async function ColumnsRoute({ params }: ColumnsRouteProps) {
  const { org, fieldId, logId } = await params;
  const { scope, organisation } = await requireScope(org);
  await orNotFound(getLog(container(), scope, logId));
  const mayChange = can(scope.role, "logs.map");
  return (
    <PageBody>
      <PageHeading
        title="What the columns mean"
        lead={
          mayChange
            ? "This is how the file was understood. Read it, change what is wrong, then let the log be read."
            : "This is how the file was understood. Your role may look at it, not change it."
        }
        actions={
          can(scope.role, "recipes.read") ? (
            <Link href={`/${organisation.slug}/recipes`} className={buttonClass("quiet")}>
              All recipes
            </Link>
          ) : null
        }
      />
      <ColumnsScreen
        logPath={`/${organisation.slug}/fields/${fieldId}/logs/${logId}`}
        logId={logId}
        role={scope.role}
      />
    </PageBody>
  );
}
