"use client";

import { useMemo, useState } from "react";
import { buildMapping } from "@/components/columns/build-mapping";
import { checkChoices } from "@/components/columns/check-choices";
import { startLayout, type FoundColumn } from "@/components/columns/column-choice";
import { ColumnLine } from "@/components/columns/column-line";
import { columnSections } from "@/components/columns/column-sections";
import { ConfirmBar } from "@/components/columns/confirm-bar";
import { DeviceCard } from "@/components/columns/device-card";
import { GroupCard, type ChangeChoices } from "@/components/columns/group-card";
import { groupColumns } from "@/components/columns/group-columns";
import { LayerPicker, viewLayer } from "@/components/columns/layer-picker";
import { MappingExtras, type Extras } from "@/components/columns/mapping-extras";
import { changeColumns, changeShape } from "@/components/columns/number-rows";
import { SpokenRecord } from "@/components/columns/spoken-record";
import { ShapeChoice } from "@/components/columns/shape-choice";
import { Notice } from "@/components/ui/notice";
import { ApiProblem } from "@/lib/api/api-problem";
import { LogMapping } from "@/lib/ingest/mapping";
import { parseIsoTime } from "@/lib/ingest/records/parse-time";
import type { Log, LogColumns } from "@/lib/schemas/logs";
import type { MachineReply } from "@/lib/schemas/machines";

export interface ColumnsFormProps {
  log: Log;
  found: LogColumns;
  machines: MachineReply[];
  /** The machine to begin with; the log's own when left out. */
  machineId?: string | null;
  /** Where a machine can be made from the file's description; null for those who may not. */
  makeMachineHref?: string | null;
  pending: boolean;
  failure: unknown;
  /** False: to look at only. */
  mayChange?: boolean;
  onSave: (mapping: LogMapping, machineId: string | null) => void;
}

function startExtras(found: LogColumns, machineId: string | null): Extras {
  const inForce = LogMapping.safeParse(found.mapping);
  const mapping = inForce.success ? inForce.data : null;
  return {
    crs: mapping?.crs ?? found.crs ?? "",
    timeZone: mapping?.timeZone ?? Intl.DateTimeFormat().resolvedOptions().timeZone,
    save: "",
    machineId: machineId ?? "",
    contact: mapping?.contact ?? null,
    rowsFromRight: mapping?.rowsFromRight ?? false,
  };
}

/** The server's words about a column, by the column's name. */
function refusedColumns(failure: unknown): Record<string, string> {
  if (!(failure instanceof ApiProblem)) return {};
  const places = failure.problem.errors ?? [];
  return Object.fromEntries(places.flatMap((place) => (place.column ? [[place.column, place.message]] : [])));
}

function startLayer({ mapping, layers }: LogColumns): string | null {
  const inForce = LogMapping.safeParse(mapping);
  return (inForce.success ? inForce.data.layer : undefined) ?? layers?.[0]?.id ?? null;
}

/** Times as ISO texts that name no offset from UTC. */
function hasZonelessTimes({ sample }: FoundColumn): boolean {
  return sample.some((text) => parseIsoTime(text)?.zoned === false);
}

function linkLayer(href: string, layer: string | null): string {
  return layer === null ? href : `${href}&layer=${encodeURIComponent(layer)}`;
}

/** The meaning of every column; where the file holds several logs, of the one chosen. */
export function ColumnsForm(props: ColumnsFormProps) {
  const { found } = props;
  const [layer, setLayer] = useState(() => startLayer(found));
  const layers = found.layers ?? [];
  if (layers.length < 2) return <LayerForm {...props} layer={null} />;
  return (
    <div className="space-y-8">
      <LayerPicker layers={layers} value={layer} onChange={setLayer} />
      <LayerForm key={layer} {...props} found={viewLayer(found, layer)} layer={layer} />
    </div>
  );
}

function LayerForm({
  log,
  found,
  machines,
  pending,
  failure,
  mayChange = true,
  machineId = log.machineId,
  makeMachineHref = null,
  onSave,
  layer,
}: ColumnsFormProps & { layer: string | null }) {
  const [layout, setLayout] = useState(() => startLayout(found));
  const { shape, choices } = layout;
  const [extras, setExtras] = useState(() => startExtras(found, machineId));
  const isConfirmed = found.mapping !== null;
  const groups = useMemo(() => groupColumns(found.columns), [found]);
  const sections = useMemo(() => columnSections(groups, isConfirmed), [groups, isConfirmed]);
  const cards = useMemo(() => groups.map(({ columns }) => columns.map(({ name }) => name)), [groups]);
  const zoneless = useMemo(() => found.columns.filter(hasZonelessTimes).map(({ name }) => name), [found]);
  const check = checkChoices(choices, shape, { ...extras, zoneless, cards });
  const timeZone = check.needsTimeZone ? extras.timeZone : "";
  const problems = { ...refusedColumns(failure), ...check.problems };
  const change: ChangeChoices = (names, patch) => setLayout((before) => changeColumns(before, names, patch));

  return (
    <form
      noValidate
      className="space-y-8"
      onSubmit={(event) => {
        event.preventDefault();
        onSave(buildMapping(choices, shape, { ...extras, timeZone, layer }), extras.machineId || null);
      }}
    >
      {found.recipe ? (
        <Notice state="fine">
          Read with the recipe “{found.recipe.name}”, version {found.recipe.version}. Its meanings are shown below:
          change what is wrong, and read the log again.
        </Notice>
      ) : null}
      {found.device ? (
        <DeviceCard
          device={found.device}
          machine={machines.find((machine) => machine.id === extras.machineId) ?? null}
          makeHref={mayChange && makeMachineHref ? linkLayer(makeMachineHref, layer) : null}
        />
      ) : null}
      {found.notes.map((note) => (
        <Notice key={`${note.code} ${note.message}`} state="look">
          {note.message}
        </Notice>
      ))}
      <fieldset disabled={!mayChange} className="min-w-0 space-y-8">
        <div className="max-w-md">
          <ShapeChoice value={shape} onChange={(next) => setLayout((before) => changeShape(before, next))} />
        </div>
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
        <SpokenRecord found={found} choices={choices} timeZone={timeZone} />
        <section className="space-y-3">
          <h2 className="text-section">And besides</h2>
          <MappingExtras
            extras={extras}
            onChange={(patch) => setExtras((before) => ({ ...before, ...patch }))}
            needsCrs={check.needsCrs}
            needsTimeZone={check.needsTimeZone}
            asksContact={check.asksContact}
            asksRowOrder={check.asksRowOrder}
            crsCandidates={found.crsCandidates ?? []}
            machines={machines}
          />
        </section>
      </fieldset>
      {mayChange ? <ConfirmBar check={{ ...check, problems }} pending={pending} failure={failure} /> : null}
    </form>
  );
}
