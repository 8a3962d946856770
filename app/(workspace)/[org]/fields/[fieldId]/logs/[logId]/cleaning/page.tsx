import type { Metadata } from "next";
import Link from "next/link";
import { readBasemap } from "@/app/_server/basemap";
import { requireScope } from "@/app/_server/require-scope";
import { CleaningScreen } from "@/components/cleaning/cleaning-screen";
import { buttonClass } from "@/components/ui/button";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";

export const metadata: Metadata = { title: "Cleaning rules" };

interface CleaningRouteProps {
  params: Promise<{ org: string; fieldId: string; logId: string }>;
}

export default async function CleaningRoute({ params }: CleaningRouteProps) {
  const { org, fieldId, logId } = await params;
  const { scope, organisation } = await requireScope(org);
  const basemap = readBasemap();
  return (
    <PageBody>
      <PageHeading
        title="Cleaning rules"
        lead="Rules leave doubtful readings out of maps, verdict and exports. Nothing is deleted: every reading of the file stays, and every change here can be undone."
        actions={
          <Link href={`/${organisation.slug}/fields/${fieldId}/rows?log=${logId}`} className={buttonClass("plain")}>
            See the rows
          </Link>
        }
      />
      <CleaningScreen fieldId={fieldId} logId={logId} role={scope.role} basemap={basemap} />
    </PageBody>
  );
}
