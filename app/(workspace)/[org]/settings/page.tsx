import type { Metadata } from "next";
import Link from "next/link";
import { requireScope } from "@/app/_server/require-scope";
import { PasswordSettings, PersonSettings, SessionSettings } from "@/components/settings/person-settings";
import { TokenSettings } from "@/components/settings/token-settings";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { can } from "@/lib/access/permissions";

export const metadata: Metadata = { title: "Settings" };

export default async function SettingsRoute({ params }: { params: Promise<{ org: string }> }) {
  const { org } = await params;
  const { scope, organisation, user } = await requireScope(org);
  return (
    <PageBody>
      <PageHeading title="Settings" lead={user.email} />
      <div className="max-w-3xl space-y-10">
        <PersonSettings name={user.name} contrast={user.contrast} />
        <PasswordSettings />
        <SessionSettings />
        <TokenSettings role={scope.role} />
        {can(scope.role, "recipes.read") ? (
          <section className="space-y-1">
            <h2 className="text-section">Recipes</h2>
            <p>
              <Link href={`/${organisation.slug}/recipes`}>What the columns of your files mean</Link>
            </p>
          </section>
        ) : null}
        {can(scope.role, "audit.read") ? (
          <section className="space-y-1">
            <h2 className="text-section">Record of changes</h2>
            <p>
              <Link href={`/${organisation.slug}/settings/audit`}>Who changed what, and when</Link>
            </p>
          </section>
        ) : null}
      </div>
    </PageBody>
  );
}
