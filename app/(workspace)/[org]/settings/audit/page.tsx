import type { Metadata } from "next";
import { requireScope } from "@/app/_server/require-scope";
import { AuditList } from "@/components/people/audit-list";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { RoleBars } from "@/components/ui/role-bars";
import { can } from "@/lib/access/permissions";

export const metadata: Metadata = { title: "Record of changes" };

export default async function AuditRoute({ params }: { params: Promise<{ org: string }> }) {
  const { org } = await params;
  const { scope } = await requireScope(org);
  if (!can(scope.role, "audit.read")) return <RoleBars role={scope.role} toDo="see the record of changes" />;
  return (
    <PageBody>
      <PageHeading title="Record of changes" lead="Kept for owners. Nothing here can be changed." />
      <AuditList />
    </PageBody>
  );
}
