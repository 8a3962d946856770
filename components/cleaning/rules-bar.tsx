"use client";

import { useState } from "react";
import { nameRules } from "@/components/cleaning/cleaning-draft";
import { Button } from "@/components/ui/button";
import { TextField } from "@/components/ui/form-field";
import { Notice } from "@/components/ui/notice";
import { describeFailure } from "@/lib/api/api-problem";
import type { CleaningCode } from "@/lib/cleaning/rule-catalogue";

export interface RulesBarProps {
  changed: readonly CleaningCode[];
  hasProblems: boolean;
  isCounting: boolean;
  pending: boolean;
  failure: unknown;
  /** What the draft would leave out, in words; null until counted. */
  outcome: string | null;
  onUse: (note: string) => void;
  onDrop: () => void;
}

/** While rules were changed and are not in force: what they would do, and the two ways on. Stays in sight. */
export function RulesBar(props: RulesBarProps) {
  const { changed, hasProblems, isCounting, pending, failure, outcome, onUse, onDrop } = props;
  const [note, setNote] = useState("");
  return (
    <section
      aria-label="Changed rules"
      className="sticky bottom-14 z-20 -mx-4 space-y-2 border-t border-ink bg-paper px-4 py-3 md:bottom-0 md:mx-0 md:px-0"
    >
      {failure ? (
        <Notice state="act" urgent title="Not done">
          {describeFailure(failure)}
        </Notice>
      ) : null}
      <div className="flex flex-wrap items-end justify-between gap-x-6 gap-y-2">
        <div role="status" className="min-w-0 flex-1 basis-72">
          <p>
            <b className="font-semibold">Not in use yet:</b> {nameRules(changed)} changed.
          </p>
          <p className="text-table text-ink-soft">
            {hasProblems ? "A number above does not make sense yet." : isCounting ? "Counting…" : outcome}
          </p>
        </div>
        <TextField
          label="Why (for the history)"
          className="w-full md:w-64"
          value={note}
          maxLength={200}
          onChange={(event) => setNote(event.target.value)}
        />
        <div className="flex gap-2 max-md:w-full max-md:[&>*]:flex-1">
          <Button onClick={onDrop} disabled={pending}>
            Drop the changes
          </Button>
          <Button kind="primary" disabled={hasProblems || pending} onClick={() => onUse(note.trim())}>
            {pending ? "Working it out…" : "Use these rules"}
          </Button>
        </div>
      </div>
    </section>
  );
}
