import type { Metadata } from "next";
import { readBasemap } from "@/app/_server/basemap";
import { requireScope } from "@/app/_server/require-scope";
import { FieldSettings } from "@/components/fields/field-settings";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";

export const metadata: Metadata = { title: "About this field" };

export default async function FieldSettingsRoute({ params }: { params: Promise<{ org: string; fieldId: string }> }) {
  const { org, fieldId } = await params;
  const { organisation } = await requireScope(org, "fields.write");
  return (
    <PageBody>
      <PageHeading title="About this field" />
      <FieldSettings slug={organisation.slug} fieldId={fieldId} basemap={readBasemap()} />
    </PageBody>
  );
}
