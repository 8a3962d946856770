"use client";

import { useMemo, useState } from "react";
import { buildMapping } from "@/components/columns/build-mapping";
import { checkChoices } from "@/components/columns/check-choices";
import { startChoices, type ColumnChoice } from "@/components/columns/column-choice";
import { ColumnLine } from "@/components/columns/column-line";
import { columnSections } from "@/components/columns/column-sections";
import { ConfirmBar } from "@/components/columns/confirm-bar";
import { GroupCard, type ChangeChoices } from "@/components/columns/group-card";
import { groupColumns } from "@/components/columns/group-columns";
import { MappingExtras, type Extras } from "@/components/columns/mapping-extras";
import { Notice } from "@/components/ui/notice";
import { ApiProblem } from "@/lib/api/api-problem";
import { LogMapping } from "@/lib/ingest/mapping";
import type { Log, LogColumns } from "@/lib/schemas/logs";
import type { MachineReply } from "@/lib/schemas/machines";

export interface ColumnsFormProps {
  log: Log;
  found: LogColumns;
  machines: MachineReply[];
  pending: boolean;
  failure: unknown;
  onSave: (mapping: LogMapping, machineId: string | null) => void;
}

function startExtras(log: Log, found: LogColumns): Extras {
  const inForce = LogMapping.safeParse(found.mapping);
  const mapping = inForce.success ? inForce.data : null;
  return {
    crs: mapping?.crs ?? "",
    timeZone: mapping?.timeZone ?? Intl.DateTimeFormat().resolvedOptions().timeZone,
    save: "",
    machineId: log.machineId ?? "",
  };
}

/** The server's words about a column, by the column's name. */
function refusedColumns(failure: unknown): Record<string, string> {
  if (!(failure instanceof ApiProblem)) return {};
  const places = failure.problem.errors ?? [];
  return Object.fromEntries(places.flatMap((place) => (place.column ? [[place.column, place.message]] : [])));
}

export function ColumnsForm({ log, found, machines, pending, failure, onSave }: ColumnsFormProps) {
  const [choices, setChoices] = useState(() => startChoices(found));
  const [extras, setExtras] = useState(() => startExtras(log, found));
  const isConfirmed = found.mapping !== null;
  const sections = useMemo(() => columnSections(groupColumns(found.columns), isConfirmed), [found, isConfirmed]);
  const check = checkChoices(choices, found.shape, extras);
  const problems = { ...refusedColumns(failure), ...check.problems };
  const change: ChangeChoices = (names, patch) =>
    setChoices((before) => {
      const changed = names.map((name): [string, ColumnChoice] => {
        const next = {
          ...(before[name] ?? { use: "undecided", channel: null, row: null, unit: null, format: "", seen: false }),
          ...patch,
        };
        return [name, next];
      });
      return { ...before, ...Object.fromEntries(changed) };
    });

  return (
    <form
      noValidate
      className="space-y-8"
      onSubmit={(event) => {
        event.preventDefault();
        onSave(buildMapping(choices, found.shape, extras), extras.machineId || null);
      }}
    >
      {found.recipe ? (
        <Notice state="fine">The recipe “{found.recipe.name}” fits this file; its meanings are shown below.</Notice>
      ) : null}
      {found.notes.map((note) => (
        <Notice key={note.code} state="look">
          {note.message}
        </Notice>
      ))}
      {sections.map((section) => (
        <section key={section.id} className="space-y-3" aria-labelledby={`section-${section.id}`}>
          <h2 id={`section-${section.id}`} className="text-section">
            {section.title}
          </h2>
          {section.groups.map((group) => {
            const [column] = group.columns;
            const choice = column ? choices[column.name] : undefined;
            if (group.columns.length > 1 || !column || !choice) {
              return (
                <GroupCard key={group.key} group={group} choices={choices} problems={problems} onChange={change} />
              );
            }
            return (
              <article
                key={group.key}
                className="sheet p-4"
                aria-label={`Column ${column.name}`}
                data-waiting={!choice.seen || undefined}
              >
                <ColumnLine
                  column={column}
                  choice={choice}
                  problem={problems[column.name]}
                  onChange={(patch) => change([column.name], patch)}
                />
              </article>
            );
          })}
        </section>
      ))}
      <section className="space-y-3">
        <h2 className="text-section">And besides</h2>
        <MappingExtras
          extras={extras}
          onChange={(patch) => setExtras((before) => ({ ...before, ...patch }))}
          needsCrs={check.needsCrs}
          needsTimeZone={check.needsTimeZone}
          machines={machines}
        />
      </section>
      <ConfirmBar check={{ ...check, problems }} pending={pending} failure={failure} />
    </form>
  );
}
