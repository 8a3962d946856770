"use client";

import { useMemo } from "react";
import { useAuditPages } from "@/components/hooks/use-people";
import { DataTable, type DataColumn } from "@/components/ui/data-table";
import { formatMoment } from "@/components/ui/format-date";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { describeFailure } from "@/lib/api/api-problem";
import type { AuditList as AuditListBody } from "@/lib/schemas/people";
import type { z } from "zod";

type Entry = z.infer<typeof AuditListBody>["items"][number];

function valueWords(value: unknown): string {
  if (value === null || value === undefined || value === "") return "nothing";
  return typeof value === "string" ? value : JSON.stringify(value);
}

function asRecord(value: unknown): Record<string, unknown> {
  return typeof value === "object" && value !== null ? { ...value } : {};
}

/** `name: East quarter, logs: 2`; of a change, what was there and what is there now: `farm: nothing → Larkspur Flats`. */
export function detailWords(detail: Record<string, unknown>): string {
  const { before, after, changed, ...rest } = detail;
  const [was, is] = [asRecord(before), asRecord(after)];
  const keys = Array.isArray(changed) ? changed.map(String) : [];
  const changes = keys.map((key) =>
    key in is ? `${key}: ${valueWords(was[key])} → ${valueWords(is[key])}` : `${key} changed`,
  );
  return [...Object.entries(rest).map(([key, value]) => `${key}: ${valueWords(value)}`), ...changes].join(", ");
}

const VERBS: Record<string, string> = {
  create: "made",
  update: "changed",
  delete: "deleted",
  revoke: "withdrew",
  add: "added",
  remove: "removed",
  upload: "took in",
  export: "exported",
};

/** `share.create` as "made a share"; what is not in the list is shown as it is. */
export function actionWords(action: string): string {
  const [noun = "", verb = ""] = action.split(".");
  const said = VERBS[verb];
  return said ? `${said} a ${noun.replaceAll(/[-_]/g, " ")}` : action;
}

/** Who changed what, and when. For owners. */
export function AuditList() {
  const audit = useAuditPages();
  const columns = useMemo<DataColumn<Entry>[]>(
    () => [
      { id: "at", header: "When", value: (entry) => entry.at, cell: (entry) => formatMoment(entry.at) },
      { id: "who", header: "Who", value: (entry) => entry.userName ?? "the program" },
      { id: "action", header: "Did", value: (entry) => actionWords(entry.action) },
      { id: "subject", header: "To", value: (entry) => entry.subject },
      { id: "detail", header: "Detail", value: (entry) => detailWords(entry.detail) },
    ],
    [],
  );
  if (audit.isPending) return <Loading what="the record of changes" />;
  if (!audit.items)
    return (
      <Notice state="act" urgent>
        {describeFailure(audit.error)}
      </Notice>
    );
  return (
    <DataTable
      caption="Changes, newest first"
      rows={audit.items}
      more={audit.more}
      columns={columns}
      rowId={(entry) => entry.id}
      fileName="audit"
      initialSort={{ id: "at", desc: true }}
      nothingWords="No change has been recorded yet."
    />
  );
}
