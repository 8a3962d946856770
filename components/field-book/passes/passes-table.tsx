"use client";

import { useMemo } from "react";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import {
  groupLineColumns,
  passColumns,
  rampColumns,
  type GroupLine,
  type RampLine,
} from "@/components/field-book/passes/pass-columns";
import { usePassStatistics, useRamps } from "@/components/field-book/passes/use-pass-figures";
import { TableSheet } from "@/components/field-book/table-sheet";
import { Button } from "@/components/ui/button";
import { DataTable } from "@/components/ui/data-table";
import { tableText } from "@/components/ui/table-text";
import { useUnits } from "@/components/units/use-units";
import { channelWords } from "@/lib/legend/channel-words";
import type { PassStatisticsBody, RampsBody } from "@/lib/schemas/pass-figures";

/** Everything known of the passes: each one, by groups, and metre by metre at both ends. */
export function PassesTable({ onClose }: { onClose: () => void }) {
  const version = useLogVersion();
  const channel = useBookState((state) => state.channel);
  const { data: statistics } = usePassStatistics(version, channel);
  const { data: ramps } = useRamps(version, channel);
  if (!statistics || !ramps) return <div className="hatch h-full" role="status" aria-label="Comparing the passes" />;
  return <Tables statistics={statistics} ramps={ramps} onClose={onClose} />;
}

interface TablesProps {
  statistics: PassStatisticsBody;
  ramps: RampsBody;
  onClose: () => void;
}

function Tables({ statistics, ramps, onClose }: TablesProps) {
  const { system } = useUnits();
  const { store, log } = useBook();
  const chosen = useBookState((state) => state.pass);
  const { unit, channel, items } = statistics;
  const columns = useMemo(() => passColumns(items, { unit, channel, system }), [items, unit, channel, system]);
  const groups = useMemo(() => groupLineColumns({ unit, channel, system }), [unit, channel, system]);
  const metres = useMemo(() => rampColumns({ unit: ramps.unit, channel: ramps.channel, system }), [ramps, system]);
  const name = channelWords(channel).name.toLowerCase();
  const file = `${channel.replaceAll(/[^a-zA-Z]+/g, "-")}-${log.name.replaceAll(/[^\w]+/g, "-")}`;
  return (
    <TableSheet
      title={`Passes, ${name}, weighted by distance`}
      text={() => tableText(columns, items)}
      onClose={onClose}
    >
      <DataTable
        stickyFirst
        caption={`The passes compared by ${name}`}
        rows={items}
        columns={columns}
        rowId={(item) => String(item.pass)}
        fileName={`passes-${file}`}
        actions={(item) => (
          <Button
            kind="quiet"
            aria-pressed={item.pass === chosen}
            aria-label={`Unroll pass ${item.pass}`}
            onClick={() => store.getState().choosePass(item.pass)}
          >
            {item.pass === chosen ? "Unrolled" : "Unroll"}
          </Button>
        )}
      />
      <h3 className="mb-2 mt-6 text-section">By direction, headland, speed and turn</h3>
      <DataTable
        caption={`Groups of passes compared by ${name}`}
        rows={linesOf(statistics)}
        columns={groups}
        rowId={({ by, group }) => `${by} ${group.key}`}
        fileName={`pass-groups-${file}`}
      />
      <h3 className="mb-2 mt-6 text-section">Starts and ends, metre by metre</h3>
      <DataTable
        caption={`First and last metres of the passes by ${name}`}
        rows={metresOf(ramps)}
        columns={metres}
        rowId={({ end, metre }) => `${end} ${metre.fromM}`}
        fileName={`starts-and-ends-${file}`}
        nothingWords={ramps.reason ?? "Nothing here yet."}
      />
    </TableSheet>
  );
}

function linesOf({ comparisons }: PassStatisticsBody): GroupLine[] {
  return comparisons.flatMap(({ by, groups }) => groups.map((group) => ({ by, group })));
}

function metresOf({ start, end }: RampsBody): RampLine[] {
  return [
    ...start.metres.map((metre): RampLine => ({ end: "start", metre })),
    ...end.metres.map((metre): RampLine => ({ end: "end", metre })),
  ];
}
