import type { Metadata } from "next";
import { readBasemap } from "@/app/_server/basemap";
import { requireScope } from "@/app/_server/require-scope";
import { NewField } from "@/components/fields/new-field";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";

export const metadata: Metadata = { title: "New field" };

export default async function NewFieldRoute({ params }: { params: Promise<{ org: string }> }) {
  const { org } = await params;
  const { organisation } = await requireScope(org, "fields.write");
  return (
    <PageBody>
      <PageHeading title="New field" />
      <NewField slug={organisation.slug} basemap={readBasemap()} />
    </PageBody>
  );
}
