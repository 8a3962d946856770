import type { ReactNode } from "react";
import { requireScope } from "@/app/_server/require-scope";
import { ActInOrganisation } from "@/components/hooks/act-in-organisation";
import { RemovalsProvider } from "@/components/removals/use-removals";
import { WorkspaceChapters } from "@/components/ui/workspace-chapters";
import { WorkspaceHeader } from "@/components/ui/workspace-header";
import { UnitsProvider } from "@/components/units/use-units";

interface WorkspaceLayoutProps {
  children: ReactNode;
  params: Promise<{ org: string }>;
}

/** The frame of every page behind sign-in. Membership is checked here for display; every query checks it again. */
export default async function WorkspaceLayout({ children, params }: WorkspaceLayoutProps) {
  const { org } = await params;
  const { scope, organisation, user } = await requireScope(org);
  const person = { name: user.name, email: user.email, role: scope.role };
  return (
    <UnitsProvider start={user.unitSystem} own={user.unitPreferences}>
      <ActInOrganisation slug={organisation.slug} />
      {/* The whole page takes its colours from here, menus and dialogs too (see globals.css). */}
      {user.contrast === "more" ? <span hidden data-contrast="more" /> : null}
      <a
        href="#content"
        className="sr-only focus:not-sr-only focus:fixed focus:left-2 focus:top-2 focus:z-50 focus:bg-sheet focus:p-2"
      >
        Skip to the page
      </a>
      <RemovalsProvider>
        <WorkspaceHeader slug={organisation.slug} organisationName={organisation.name} person={person} />
        <WorkspaceChapters slug={organisation.slug} role={scope.role} />
        <main id="content" className="pb-24 md:pb-10 md:pl-[5.5rem] print:p-0">
          {children}
        </main>
      </RemovalsProvider>
    </UnitsProvider>
  );
}
