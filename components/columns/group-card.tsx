"use client";

import { useState } from "react";
import { ColumnLine } from "@/components/columns/column-line";
import type { Choices, ColumnChoice } from "@/components/columns/column-choice";
import type { ColumnGroup } from "@/components/columns/group-columns";
import { MeaningEditor } from "@/components/columns/meaning-editor";
import { ConfidenceMark, Sentence } from "@/components/columns/sentence";
import { sayGroup } from "@/components/columns/say-meaning";
import { Button } from "@/components/ui/button";
import { StateMark } from "@/components/ui/state-mark";

export type ChangeChoices = (names: string[], patch: Partial<ColumnChoice>) => void;

export interface GroupCardProps {
  group: ColumnGroup;
  choices: Choices;
  problems: Record<string, string>;
  onChange: ChangeChoices;
}

/** Many columns that are one thing, row by row: one sentence, changed together or one by one. */
export function GroupCard({ group, choices, problems, onChange }: GroupCardProps) {
  const names = group.columns.map((column) => column.name);
  const members = group.columns.flatMap((column) => choices[column.name] ?? []);
  const saying = sayGroup(group.columns, members);
  const waiting = members.some((choice) => !choice.seen || choice.use === "undecided");
  const undecided = members.some(
    (choice) => choice.use === "undecided" || (choice.use === "channel" && choice.unit === null),
  );
  const [editing, setEditing] = useState(undecided);
  const [open, setOpen] = useState(false);
  const [first] = members;
  const wrong = names.filter((name) => problems[name]);
  const lowest = Math.min(...group.columns.map((column) => column.proposal?.confidence ?? 0));
  if (!first) return null;
  return (
    <article className="sheet space-y-3 p-4" aria-label={`${names.length} columns`} data-waiting={waiting || undefined}>
      <div className="flex flex-wrap items-start justify-between gap-x-4 gap-y-2">
        <div className="min-w-0 flex-1 basis-72 space-y-1">
          {saying ? (
            <Sentence>{saying}</Sentence>
          ) : (
            <p>
              Columns {names[0]} … {names.at(-1)} are no longer one thing: see them one by one.
            </p>
          )}
          <p className="text-table text-ink-soft">
            <ConfidenceMark confidence={lowest} seen={!waiting} /> · {names.length} columns
          </p>
        </div>
        <div className="flex flex-wrap gap-2">
          {waiting && !undecided ? (
            <Button kind="primary" onClick={() => onChange(names, { seen: true })}>
              That is right
            </Button>
          ) : null}
          <Button aria-expanded={editing} onClick={() => setEditing(!editing)}>
            {editing ? "Done changing" : "Change all"}
          </Button>
        </div>
      </div>
      {editing ? (
        <MeaningEditor
          of={`columns ${names[0]} to ${names.at(-1)}`}
          choice={first}
          withRow={false}
          ownName={
            group.key
              .split(":")
              .at(-1)
              ?.replaceAll("#", "")
              .replace(/[_\s-]+$/, "") || "column"
          }
          onChange={(patch) => onChange(names, { ...patch, seen: true })}
        />
      ) : null}
      {wrong.length > 0 && !open ? (
        <p className="flex items-start gap-2 text-clay">
          <StateMark state="act" className="mt-1" />
          {problems[wrong[0] ?? ""]} {wrong.length > 1 ? `The same goes for ${wrong.length - 1} more.` : ""}
        </p>
      ) : null}
      <details open={open} onToggle={(event) => setOpen(event.currentTarget.open)}>
        <summary className="inline-flex min-h-11 items-center text-slate underline underline-offset-3 md:min-h-8">
          {open ? "Fold the columns" : "See the columns one by one"}
        </summary>
        {open ? (
          <ul className="mt-2 divide-y divide-rule border-t border-rule">
            {group.columns.map((column) => (
              <li key={column.name} className="py-3">
                <ColumnLine
                  column={column}
                  choice={choices[column.name] ?? first}
                  problem={problems[column.name]}
                  onChange={(patch) => onChange([column.name], patch)}
                />
              </li>
            ))}
          </ul>
        ) : null}
      </details>
    </article>
  );
}
