import type { Metadata } from "next";
import { requireScope } from "@/app/_server/require-scope";
import { FieldBook } from "@/components/field-book/field-book";

export const metadata: Metadata = { title: "Rows" };

interface RowsPageProps {
  params: Promise<{ org: string; fieldId: string }>;
}

/** The chapter "Rows". Whether the field may be seen is decided by the queries behind it. */
export default async function RowsPage({ params }: RowsPageProps) {
  const { org, fieldId } = await params;
  const { scope } = await requireScope(org);
  const basemap = {
    styleUrl: process.env.BASEMAP_STYLE_URL || null,
    tilesUrl: process.env.BASEMAP_TILES_URL || null,
    attribution: process.env.BASEMAP_ATTRIBUTION || null,
  };
  const logsHref = `/${org}/fields/${fieldId}/logs`;
  return <FieldBook fieldId={fieldId} logsHref={logsHref} basemap={basemap} role={scope.role} />;
}
