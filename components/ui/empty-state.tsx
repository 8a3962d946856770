import type { ReactNode } from "react";

/** An empty page that says what belongs here and how to begin. */
export function EmptyState({ title, children, action }: { title: string; children: ReactNode; action?: ReactNode }) {
  return (
    <section className="max-w-xl space-y-3 py-8">
      <h2 className="text-section">{title}</h2>
      <div className="space-y-2 text-ink-soft">{children}</div>
      {action ? <div className="flex flex-wrap gap-2 pt-2">{action}</div> : null}
    </section>
  );
}
