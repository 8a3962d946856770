"use client";

import { useSearchParams } from "next/navigation";
import { useState } from "react";
import { BookExport } from "@/components/export/book-export";
import { CompareButton } from "@/components/field-book/compare/compare-button";
import { SecondBookProvider } from "@/components/field-book/compare/second-book";
import { CopyLink } from "@/components/field-book/copy-link";
import { FieldBookProvider } from "@/components/field-book/field-book-context";
import { BookKeys } from "@/components/field-book/keys/book-keys";
import { LogPicker } from "@/components/field-book/log-picker";
import { NoLogYet } from "@/components/field-book/no-log-yet";
import { RowsLayout, RowsSkeleton } from "@/components/field-book/rows-layout";
import { channelsOf } from "@/components/field-book/channel-switch";
import { useAddress } from "@/components/field-book/use-address";
import { useField } from "@/components/hooks/use-fields";
import { useLogs } from "@/components/hooks/use-logs";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { NotesAccessProvider } from "@/components/notes/notes-access";
import { BookPictures } from "@/components/pictures/book-pictures";
import { can, type Role } from "@/lib/access/permissions";
import { readAddress } from "@/lib/map-state/address-state";
import { createFieldBookStore } from "@/lib/map-state/field-book-store";
import type { Field } from "@/lib/schemas/fields";
import type { Log } from "@/lib/schemas/logs";

export interface FieldBookProps {
  fieldId: string;
  /** Address of the field's list of logs. */
  logsHref: string;
  basemap: BasemapConfig;
  role: Role;
}

/** The chapter "Rows" of one field's book: picks the log, then shows it. */
export function FieldBook({ fieldId, logsHref, basemap, role }: FieldBookProps) {
  const field = useField(fieldId);
  const logs = useLogs(fieldId);
  const search = useSearchParams();
  const [chosenId, setChosenId] = useState(search.get("log"));
  if (logs.isError || field.isError) return <FieldTrouble />;
  if (!logs.data || !field.data) return <RowsSkeleton />;
  const ready = logs.data.items.filter((log) => log.status === "ready" && log.bbox !== null);
  const log =
    ready.find((candidate) => candidate.id === chosenId) ?? ready.find(({ kind }) => kind === "seeding") ?? ready[0];
  if (!log) return <NoLogYet logs={logs.data.items} logsHref={logsHref} />;
  return (
    <NotesAccessProvider fieldId={fieldId} mayWrite={can(role, "notes.write")}>
      <OpenLog
        key={`${log.id} ${log.version} ${log.revision ?? 0}`}
        field={field.data}
        log={log}
        logs={ready}
        logsHref={logsHref}
        basemap={basemap}
        picker={
          <div className="flex min-w-0 items-center gap-2">
            <LogPicker logs={ready} chosen={log} onChoose={setChosenId} />
            <CompareButton />
            <CopyLink />
            <BookKeys />
            {can(role, "logs.export") ? <BookExport /> : null}
          </div>
        }
      />
    </NotesAccessProvider>
  );
}

interface OpenLogProps {
  field: Field;
  log: Log;
  /** Logs of the field that can be looked at. */
  logs: readonly Log[];
  logsHref: string;
  basemap: BasemapConfig;
  picker: React.ReactNode;
}

function OpenLog({ field, log, logs, logsHref, basemap, picker }: OpenLogProps) {
  const search = useSearchParams();
  const [book] = useState(() => {
    const { log: addressLog, ...address } = readAddress(new URLSearchParams(search.toString()));
    // Pass, row and view in an address belong to the log it names, not to another one.
    const { edges = null, ...start } =
      addressLog === log.id ? address : { channel: address.channel, cleaned: address.cleaned };
    const channels = channelsOf(log);
    const channel = start.channel && channels.includes(start.channel) ? start.channel : (channels[0] ?? "rowSpeed");
    return {
      store: createFieldBookStore({
        ...start,
        channel,
        // Edges are those of the channel in the address.
        edges: edges && channel === start.channel ? { [channel]: edges } : {},
      }),
      log,
      logVersion: { logId: log.id, version: log.version, revision: log.revision },
    };
  });
  useAddress(book.store, log.id);
  return (
    <FieldBookProvider book={book}>
      <BookPictures field={field}>
        <SecondBookProvider logs={logs}>
          <RowsLayout field={field} basemap={basemap} picker={picker} logsHref={logsHref} />
        </SecondBookProvider>
      </BookPictures>
    </FieldBookProvider>
  );
}

function FieldTrouble() {
  return (
    <p role="alert" className="max-w-xl px-5 py-8 text-ink-soft">
      This field could not be fetched. Check the connection and reload the page; if it says the same again, go back to
      the list of fields.
    </p>
  );
}
