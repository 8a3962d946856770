"use client";

import { useBook } from "@/components/field-book/field-book-context";
import { QuietLink } from "@/components/ui/quiet-link";

/** From the rows of a log to its rules, with whether they change anything. */
export function CleaningLink({ logsHref }: { logsHref: string }) {
  const { log } = useBook();
  const isCleaned = (log.revision ?? 0) > 0;
  return (
    <p className="px-4 pb-3 text-table text-ink-soft">
      {isCleaned ? "This log’s rules leave readings out or move them. " : "No reading in a pass is left out. "}
      <QuietLink
        href={`${logsHref}/${log.id}/cleaning`}
        className="inline-flex min-h-11 items-center text-slate underline md:min-h-6"
      >
        Cleaning rules
      </QuietLink>
    </p>
  );
}
