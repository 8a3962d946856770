import type { Metadata } from "next";
import { requireScope } from "@/app/_server/require-scope";
import { AuditList } from "@/components/people/audit-list";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";

export const metadata: Metadata = { title: "Record of changes" };

export default async function AuditRoute({ params }: { params: Promise<{ org: string }> }) {
  const { org } = await params;
  await requireScope(org, "audit.read");
  return (
    <PageBody>
      <PageHeading title="Record of changes" lead="Kept for owners. Nothing here can be changed." />
      <AuditList />
    </PageBody>
  );
}
