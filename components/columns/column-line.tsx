"use client";

import { useState } from "react";
import type { ColumnChoice, FoundColumn } from "@/components/columns/column-choice";
import { MeaningEditor } from "@/components/columns/meaning-editor";
import { ConfidenceMark, Sentence } from "@/components/columns/sentence";
import { sayColumn } from "@/components/columns/say-meaning";
import { Button } from "@/components/ui/button";
import { StateMark } from "@/components/ui/state-mark";

const SHOWN_SAMPLES = 3;

export interface ColumnLineProps {
  column: FoundColumn;
  choice: ColumnChoice;
  problem: string | undefined;
  onChange: (patch: Partial<ColumnChoice>) => void;
}

/** One column: what it was taken to mean, what stands in it, and the means to say otherwise. */
export function ColumnLine({ column, choice, problem, onChange }: ColumnLineProps) {
  const undecided = choice.use === "undecided" || (choice.use === "channel" && choice.unit === null);
  const [editing, setEditing] = useState(undecided);
  const waiting = !choice.seen;
  return (
    <div className="space-y-3">
      <div className="flex flex-wrap items-start justify-between gap-x-4 gap-y-2">
        <div className="min-w-0 flex-1 basis-72 space-y-1">
          <Sentence>{sayColumn(column, choice)}</Sentence>
          <p className="break-words text-table text-ink-soft">
            {column.proposal ? (
              <>
                <ConfidenceMark confidence={column.proposal.confidence} seen={choice.seen} />
                {waiting && column.proposal.reason ? `: ${column.proposal.reason}` : null}
                {" · "}
              </>
            ) : null}
            <span className="tabular">
              {column.sample.slice(0, SHOWN_SAMPLES).join(" · ") || "empty in the lines looked at"}
            </span>
          </p>
        </div>
        <div className="flex flex-wrap gap-2">
          {waiting && !undecided ? (
            <Button kind="primary" onClick={() => onChange({ seen: true })}>
              That is right
            </Button>
          ) : null}
          {choice.use === "undecided" ? (
            <Button onClick={() => onChange({ use: "out", seen: true })}>Leave out</Button>
          ) : null}
          <Button aria-expanded={editing} onClick={() => setEditing(!editing)}>
            {editing ? "Done changing" : "Change"}
          </Button>
        </div>
      </div>
      {editing ? (
        <MeaningEditor
          of={`column ${column.name}`}
          choice={choice}
          withRow
          ownName={column.name.slice(0, 80).replaceAll(/[/\\]/g, " ")}
          onChange={(patch) => onChange({ ...patch, seen: true })}
        />
      ) : null}
      {problem ? (
        <p role="alert" className="flex items-start gap-2 text-clay">
          <StateMark state="act" className="mt-1" />
          {problem}
        </p>
      ) : null}
    </div>
  );
}
