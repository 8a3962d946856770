"use client";

import { useMemo } from "react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { groupColumns } from "@/components/field-book/line-up/group-columns";
import { useToolbarLayout } from "@/components/field-book/line-up/use-line-up-layout";
import { lineUpColumns } from "@/components/field-book/line-up-columns";
import { TableSheet } from "@/components/field-book/table-sheet";
import { Button } from "@/components/ui/button";
import { DataTable } from "@/components/ui/data-table";
import { tableText } from "@/components/ui/table-text";
import { useUnits } from "@/components/units/use-units";
import { channelWords } from "@/lib/legend/channel-words";
import type { RowStatisticsBody } from "@/lib/schemas/logs";
import { groupRows } from "@/lib/statistics/group-rows";

export interface LineUpTableProps {
  statistics: RowStatisticsBody;
  onClose: () => void;
}

/** Everything the line-up knows, row by row and by parts of the machine, in the person's units: sort, find, copy, save as CSV. */
export function LineUpTable({ statistics, onClose }: LineUpTableProps) {
  const { system } = useUnits();
  const { store, log } = useBook();
  const selected = useBookState((state) => state.row);
  const columns = useMemo(() => lineUpColumns(statistics, system), [statistics, system]);
  const name = channelWords(statistics.channel).name;
  const fileName = `${statistics.channel.replaceAll(/[^a-zA-Z]+/g, "-")}-${log.name.replaceAll(/[^\w]+/g, "-")}`;
  return (
    <TableSheet
      title={`Line-up, ${name.toLowerCase()}, weighted by distance`}
      text={() => tableText(columns, statistics.items)}
      onClose={onClose}
    >
      <DataTable
        stickyFirst
        caption={`The rows compared by ${name.toLowerCase()}`}
        rows={statistics.items}
        columns={columns}
        rowId={(item) => String(item.row)}
        fileName={`line-up-${fileName}`}
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
      <GroupTable statistics={statistics} fileName={`parts-${fileName}`} />
    </TableSheet>
  );
}

function GroupTable({ statistics, fileName }: { statistics: RowStatisticsBody; fileName: string }) {
  const { system } = useUnits();
  const layout = useToolbarLayout(statistics.items.length);
  const { unit, channel } = statistics;
  const groups = useMemo(() => groupRows(statistics, layout), [statistics, layout]);
  const columns = useMemo(() => groupColumns({ groups, unit, channel, system }), [groups, unit, channel, system]);
  if (groups.length === 0) return null;
  return (
    <section aria-labelledby="line-up-parts" className="mt-6">
      <h3 id="line-up-parts" className="mb-2 text-section">
        Wings, sections and wheel tracks
      </h3>
      <DataTable
        caption="Parts of the machine compared"
        rows={groups}
        columns={columns}
        rowId={(group) => group.id}
        fileName={fileName}
      />
    </section>
  );
}
