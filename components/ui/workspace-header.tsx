"use client";

import { useParams } from "next/navigation";
import { Wordmark } from "@/components/ui/wordmark";
import { PersonMenu, type Person } from "@/components/settings/person-menu";
import { useField } from "@/components/hooks/use-fields";
import { UnitSwitch } from "@/components/units/unit-switch";
import { QuietLink } from "@/components/ui/quiet-link";

export interface WorkspaceHeaderProps {
  slug: string;
  organisationName: string;
  person: Person;
}

/** One line: where one is, in which units, as whom. */
export function WorkspaceHeader({ slug, organisationName, person }: WorkspaceHeaderProps) {
  const { fieldId } = useParams<{ fieldId?: string }>();
  const field = useField(fieldId);
  return (
    <header className="no-print sticky top-0 z-30 flex h-14 items-center gap-3 border-b border-rule bg-paper px-4 md:px-5">
      <Wordmark href={`/${slug}/fields`} short={fieldId !== undefined} />
      <p className="min-w-0 flex-1 truncate text-text">
        {fieldId ? (
          <>
            <QuietLink href={`/${slug}/fields`} className="md:sr-only">
              Fields
            </QuietLink>
            <span className="px-2 text-ink-faint md:hidden">/</span>
            <span className="font-semibold">{field.data?.name ?? ""}</span>
            {field.data?.farm ? <span className="text-ink-soft max-md:hidden"> · {field.data.farm}</span> : null}
          </>
        ) : (
          <span className="text-ink-soft">{organisationName}</span>
        )}
      </p>
      <div className="max-md:hidden">
        <UnitSwitch />
      </div>
      <PersonMenu person={person} slug={slug} />
    </header>
  );
}
