"use client";

import { useMemo, useState } from "react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { lineUpColumns, lineUpText } from "@/components/field-book/line-up-columns";
import { Button } from "@/components/ui/button";
import { DataTable } from "@/components/ui/data-table";
import { useUnits } from "@/components/units/use-units";
import { channelWords } from "@/lib/legend/channel-words";
import type { RowStatisticsBody } from "@/lib/schemas/logs";

export interface LineUpTableProps {
  statistics: RowStatisticsBody;
  onClose: () => void;
}

/** Everything the line-up knows, in the person's units: sort, find, copy, save as CSV. */
export function LineUpTable({ statistics, onClose }: LineUpTableProps) {
  const { system } = useUnits();
  const { store, log } = useBook();
  const selected = useBookState((state) => state.row);
  const [copied, setCopied] = useState(false);
  const columns = useMemo(() => lineUpColumns(statistics, system), [statistics, system]);
  const name = channelWords(statistics.channel).name;
  const copy = () => {
    navigator.clipboard.writeText(lineUpText(columns, statistics.items)).then(
      () => setCopied(true),
      () => setCopied(false),
    );
  };
  return (
    <section aria-labelledby="line-up-table-title" className="relative h-full overflow-auto bg-paper px-4 py-3">
      <div className="mb-2 flex flex-wrap items-center justify-between gap-2">
        <h2 id="line-up-table-title" className="text-section">
          Line-up, {name.toLowerCase()}, weighted by distance
        </h2>
        <div className="flex items-center gap-2">
          <span role="status" className="text-table text-ink-soft">
            {copied ? "Copied." : ""}
          </span>
          <Button onClick={copy}>Copy</Button>
          <Button onClick={onClose}>Close the table</Button>
        </div>
      </div>
      <DataTable
        stickyFirst
        caption={`The rows compared by ${name.toLowerCase()}`}
        rows={statistics.items}
        columns={columns}
        rowId={(item) => String(item.row)}
        fileName={`line-up-${statistics.channel.replaceAll(/[^a-zA-Z]+/g, "-")}-${log.name.replaceAll(/[^\w]+/g, "-")}`}
        actions={(item) => (
          <Button
            kind="quiet"
            aria-pressed={item.row === selected}
            aria-label={`Show row ${item.row} everywhere`}
            onClick={() => store.getState().chooseRow(item.row)}
          >
            {item.row === selected ? "Shown" : "Show"}
          </Button>
        )}
      />
    </section>
  );
}
