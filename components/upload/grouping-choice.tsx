"use client";

import { useId } from "react";
import type { Grouping } from "@/lib/ingest/propose-grouping";

export interface GroupingChoiceProps {
  /** What the files look like; null while they are being looked at. */
  proposal: Grouping | null;
  together: boolean | null;
  onChange: (together: boolean) => void;
}

const CHOICES = [
  { together: true, label: "One log in parts", hint: "As a card that was written in pieces. They are read as one." },
  { together: false, label: "Separate logs", hint: "Each becomes a log of its own." },
];

/** What several files chosen at once are. */
export function GroupingChoice({ proposal, together, onChange }: GroupingChoiceProps) {
  const id = useId();
  return (
    <fieldset className="space-y-1">
      <legend className="font-semibold">One log in parts, or separate logs?</legend>
      <p role="status" className="text-table text-ink-soft">
        {proposal ? proposal.reason : "Looking at the files …"}
      </p>
      {CHOICES.map((choice) => (
        <div key={choice.label} className="flex items-start gap-3">
          <input
            id={`${id}-${choice.together}`}
            type="radio"
            name={id}
            checked={together === choice.together}
            onChange={() => onChange(choice.together)}
            aria-describedby={`${id}-${choice.together}-hint`}
            className="mt-3 h-5 w-5 shrink-0 accent-ink md:mt-2"
          />
          <div>
            <label htmlFor={`${id}-${choice.together}`} className="flex min-h-11 items-center md:min-h-9">
              {choice.label}
            </label>
            <p id={`${id}-${choice.together}-hint`} className="-mt-2 pb-2 text-table text-ink-soft">
              {choice.hint}
            </p>
          </div>
        </div>
      ))}
    </fieldset>
  );
}
