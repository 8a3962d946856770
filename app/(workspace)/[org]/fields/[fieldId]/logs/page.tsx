import type { Metadata } from "next";
import { container } from "@/app/_server/container";
import { requireScope } from "@/app/_server/require-scope";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { LogsPage } from "@/components/upload/logs-page";
import { LARKSPUR_NEXT_DAY } from "@/lib/simulator/scenario/larkspur";

export const metadata: Metadata = { title: "Logs" };

const EXAMPLE_LOG = `/demo/${LARKSPUR_NEXT_DAY.fileName}`;

export default async function LogsRoute({ params }: { params: Promise<{ org: string; fieldId: string }> }) {
  const { org, fieldId } = await params;
  const { scope, organisation } = await requireScope(org);
  return (
    <PageBody>
      <PageHeading title="Logs" />
      <LogsPage
        fieldId={fieldId}
        fieldPath={`/${organisation.slug}/fields/${fieldId}`}
        role={scope.role}
        exampleHref={container().env.isDemo ? EXAMPLE_LOG : null}
      />
    </PageBody>
  );
}
