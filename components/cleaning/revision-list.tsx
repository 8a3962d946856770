"use client";

import { Button } from "@/components/ui/button";
import { formatMoment } from "@/components/ui/format-date";
import { StateWord } from "@/components/ui/state-mark";
import type { AdjustmentRevision } from "@/lib/schemas/cleaning";

export interface RevisionListProps {
  history: readonly AdjustmentRevision[];
  /** The one in force; 0: as read. */
  revision: number;
  mayChange: boolean;
  pending: boolean;
  /** Makes what an earlier revision said the newest one. */
  onRevert: (revision: number) => void;
}

type Entry = Pick<AdjustmentRevision, "revision"> & Partial<AdjustmentRevision>;

/** Every change of the rules and delays, the newest first; each can be gone back to, and nothing is ever lost. */
export function RevisionList({ history, revision, mayChange, pending, onRevert }: RevisionListProps) {
  const entries: Entry[] = history.some((entry) => entry.revision === 0) ? [...history] : [...history, { revision: 0 }];
  return (
    <section aria-labelledby="history-title" className="space-y-3">
      <h2 id="history-title" className="text-section">
        History
      </h2>
      <ol className="max-w-3xl border-t border-rule">
        {entries.map((entry) => (
          <li
            key={entry.revision}
            aria-current={entry.revision === revision ? "true" : undefined}
            className="flex flex-wrap items-center justify-between gap-x-6 gap-y-1 border-b border-rule py-2"
          >
            <div className="min-w-0 flex-1 basis-64">
              <p className="break-words">
                <span className="tabular font-semibold">
                  {entry.revision === 0 ? "As read" : `Change ${entry.revision}`}
                </span>
                {entry.revertedTo == null ? "" : `, back to ${revisionName(entry.revertedTo)}`}
                {entry.note ? <span className="text-ink-soft">: {entry.note}</span> : null}
              </p>
              <p className="text-table text-ink-soft">{whoWords(entry)}</p>
            </div>
            {entry.revision === revision ? (
              <StateWord state="fine">In force</StateWord>
            ) : mayChange ? (
              <Button
                kind="quiet"
                disabled={pending}
                aria-label={`Go back to ${revisionName(entry.revision)}`}
                onClick={() => onRevert(entry.revision)}
              >
                Go back to this
              </Button>
            ) : null}
          </li>
        ))}
      </ol>
    </section>
  );
}

function revisionName(revision: number): string {
  return revision === 0 ? "the log as read" : `change ${revision}`;
}

function whoWords({ revision, at, by }: Entry): string {
  if (revision === 0) return "The rules that every log begins with";
  return [formatMoment(at ?? null), by ?? "somebody who has left"].filter((part) => part !== "").join(" · ");
}
