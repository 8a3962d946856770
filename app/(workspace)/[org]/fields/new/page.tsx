import type { Metadata } from "next";
import { requireScope } from "@/app/_server/require-scope";
import { NewField } from "@/components/fields/new-field";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { RoleBars } from "@/components/ui/role-bars";
import { can } from "@/lib/access/permissions";

export const metadata: Metadata = { title: "New field" };

export default async function NewFieldRoute({ params }: { params: Promise<{ org: string }> }) {
  const { org } = await params;
  const { scope, organisation } = await requireScope(org);
  if (!can(scope.role, "fields.write")) return <RoleBars role={scope.role} toDo="make fields" />;
  return (
    <PageBody>
      <PageHeading title="New field" />
      <NewField slug={organisation.slug} />
    </PageBody>
  );
}
