"use client";

import Link from "next/link";
import { useRouter } from "next/navigation";
import { useMemo, useState } from "react";
import { BoundarySketch } from "@/components/fields/boundary-sketch";
import type { MorePages } from "@/components/hooks/use-pages";
import { FieldVerdictState, fieldVerdictWords } from "@/components/fields/field-verdict-state";
import { keepDroppedFiles } from "@/components/upload/dropped-files";
import { buttonClass } from "@/components/ui/button";
import { classNames } from "@/components/ui/class-names";
import { DataTable, type DataColumn } from "@/components/ui/data-table";
import { formatDay } from "@/components/ui/format-date";
import { Quantity } from "@/components/units/quantity";
import { useUnits } from "@/components/units/use-units";
import type { Field } from "@/lib/schemas/fields";

export interface FieldsTableProps {
  slug: string;
  fields: Field[];
  mayUpload: boolean;
  more?: MorePages;
}

/** The fields of the organisation. A log file let go on a row goes to that field's upload. */
export function FieldsTable({ slug, fields, mayUpload, more }: FieldsTableProps) {
  const { areaUnit, exact } = useUnits();
  const columns = useMemo<DataColumn<Field>[]>(
    () => [
      {
        id: "name",
        header: "Field",
        value: (field) => field.name,
        cell: (field) => <FieldName slug={slug} field={field} mayUpload={mayUpload} />,
      },
      { id: "farm", header: "Farm", value: (field) => field.farm ?? undefined },
      {
        id: "area",
        header: `Area (${areaUnit})`,
        numeric: true,
        value: (field) => (field.areaM2 === null ? undefined : exact(field.areaM2, "m2")),
        cell: (field) => (field.areaM2 === null ? "–" : <Quantity value={field.areaM2} unit="m2" />),
      },
      { id: "logs", header: "Logs", numeric: true, value: (field) => field.logCount },
      {
        id: "lastLog",
        header: "Last log",
        value: (field) => field.lastLogAt ?? undefined,
        cell: (field) => formatDay(field.lastLogAt),
      },
      {
        id: "verdict",
        header: "Newest log says",
        value: (field) => fieldVerdictWords(field).word,
        cell: (field) => <FieldVerdictState field={field} mayUpload={mayUpload} />,
      },
    ],
    [areaUnit, exact, mayUpload, slug],
  );
  return (
    <DataTable
      caption="Fields of this organisation"
      rows={fields}
      columns={columns}
      rowId={(field) => field.id}
      fileName="fields"
      initialSort={{ id: "name", desc: false }}
      more={more}
      actions={(field) => (
        <Link href={`/${slug}/fields/${field.id}/logs`} className={buttonClass("quiet")}>
          Logs
        </Link>
      )}
    />
  );
}

function FieldName({ slug, field, mayUpload }: { slug: string; field: Field; mayUpload: boolean }) {
  const router = useRouter();
  const [over, setOver] = useState(false);
  const root = `/${slug}/fields/${field.id}`;
  return (
    <Link
      href={field.logCount > 0 ? `${root}/rows` : `${root}/logs`}
      className={classNames(
        "inline-flex min-h-11 items-center gap-3 rounded pr-2 font-semibold",
        over && "outline-2 outline-slate",
      )}
      onDragOver={(event) => {
        if (!mayUpload) return;
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={() => setOver(false)}
      onDrop={(event) => {
        event.preventDefault();
        const files = [...event.dataTransfer.files];
        if (files.length === 0 || !mayUpload) return;
        keepDroppedFiles(field.id, files);
        router.push(`${root}/logs`);
      }}
    >
      <BoundarySketch boundary={field.boundary} className="h-9 w-9 shrink-0" />
      {field.name}
    </Link>
  );
}
