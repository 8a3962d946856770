import type { Metadata } from "next";
import { requireScope } from "@/app/_server/require-scope";
import { PeoplePage } from "@/components/people/people-page";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { can } from "@/lib/access/permissions";

export const metadata: Metadata = { title: "People" };

export default async function PeopleRoute({ params }: { params: Promise<{ org: string }> }) {
  const { org } = await params;
  const { scope } = await requireScope(org, "members.read");
  return (
    <PageBody>
      <PageHeading title="People" />
      <PeoplePage userId={scope.userId} mayWrite={can(scope.role, "members.write")} />
    </PageBody>
  );
}
