import type { ReactNode } from "react";

export interface PageHeadingProps {
  title: string;
  /** One line under the title: what this page is for or what it shows. */
  lead?: ReactNode;
  actions?: ReactNode;
}

export function PageHeading({ title, lead, actions }: PageHeadingProps) {
  return (
    <header className="flex flex-wrap items-end justify-between gap-x-6 gap-y-3 border-b border-rule pb-4">
      <div className="max-w-2xl space-y-1">
        <h1 className="text-page">{title}</h1>
        {lead ? <p className="text-ink-soft">{lead}</p> : null}
      </div>
      {actions ? <div className="flex flex-wrap gap-2">{actions}</div> : null}
    </header>
  );
}
