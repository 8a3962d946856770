import type { Metadata } from "next";
import Link from "next/link";
import { requireScope } from "@/app/_server/require-scope";
import { FieldsPage } from "@/components/fields/fields-page";
import { buttonClass } from "@/components/ui/button";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { can } from "@/lib/access/permissions";

export const metadata: Metadata = { title: "Fields" };

export default async function FieldsRoute({ params }: { params: Promise<{ org: string }> }) {
  const { org } = await params;
  const { scope, organisation } = await requireScope(org);
  const mayWrite = can(scope.role, "fields.write");
  return (
    <PageBody>
      <PageHeading
        title="Fields"
        lead={
          can(scope.role, "logs.upload") ? (
            <>
              Open a field to take a log in<span className="max-md:hidden">, or drop the file on its name</span>.
            </>
          ) : undefined
        }
        actions={
          mayWrite ? (
            <Link href={`/${organisation.slug}/fields/new`} className={buttonClass("primary")}>
              New field
            </Link>
          ) : null
        }
      />
      <FieldsPage slug={organisation.slug} role={scope.role} />
    </PageBody>
  );
}
