import type { Metadata } from "next";
import Link from "next/link";
import { requireScope } from "@/app/_server/require-scope";
import { MachinesPage } from "@/components/machines/machines-page";
import { buttonClass } from "@/components/ui/button";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { can } from "@/lib/access/permissions";

export const metadata: Metadata = { title: "Machines" };

export default async function MachinesRoute({ params }: { params: Promise<{ org: string }> }) {
  const { org } = await params;
  const { scope, organisation } = await requireScope(org, "machines.read");
  const mayWrite = can(scope.role, "machines.write");
  const root = `/${organisation.slug}/machines`;
  return (
    <PageBody>
      <PageHeading
        title="Machines"
        actions={
          mayWrite ? (
            <>
              <Link href={`${root}/new?kind=combine`} className={buttonClass("plain")}>
                New combine
              </Link>
              <Link href={`${root}/new?kind=seeder`} className={buttonClass("primary")}>
                New drill or planter
              </Link>
            </>
          ) : null
        }
      />
      <MachinesPage slug={organisation.slug} mayWrite={mayWrite} />
    </PageBody>
  );
}
