import type { Metadata } from "next";
import Link from "next/link";
import { container } from "@/app/_server/container";
import { orNotFound, requireScope } from "@/app/_server/require-scope";
import { ComparisonScreen } from "@/components/compare-logs/comparison-screen";
import { buttonClass } from "@/components/ui/button";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import type { Scope } from "@/lib/scope";
import { getLog } from "@/lib/server/logs/read-logs";

export const metadata: Metadata = { title: "Compare logs" };

interface ComparePageProps {
  params: Promise<{ org: string; fieldId: string }>;
  searchParams: Promise<{ a?: string | string[]; b?: string | string[] }>;
}

/** The field of a log that the address names; an unknown log is not here. */
async function fieldOf(scope: Scope, logId: string | string[] | undefined): Promise<string | null> {
  if (typeof logId !== "string" || logId === "") return null;
  return (await orNotFound(getLog(container(), scope, logId))).fieldId;
}

/** Two logs before and after a change of set-up. What may be seen is decided by the queries behind it. */
export default async function ComparePage({ params, searchParams }: ComparePageProps) {
  const { org, fieldId } = await params;
  const { scope } = await requireScope(org);
  const { a, b } = await searchParams;
  const start = {
    beforeFieldId: (await fieldOf(scope, a)) ?? fieldId,
    afterFieldId: (await fieldOf(scope, b)) ?? fieldId,
  };
  const basemap = {
    styleUrl: process.env.BASEMAP_STYLE_URL || null,
    tilesUrl: process.env.BASEMAP_TILES_URL || null,
    attribution: process.env.BASEMAP_ATTRIBUTION || null,
  };
  return (
    <PageBody>
      <PageHeading
        title="Compare logs"
        lead="Before and after a change of set-up: what all rows did, what each row did beyond the others, and how sure that is."
        actions={
          <Link href={`/${org}/fields/${fieldId}/rows`} className={buttonClass("plain")}>
            See the rows
          </Link>
        }
      />
      <ComparisonScreen start={start} basemap={basemap} />
    </PageBody>
  );
}
