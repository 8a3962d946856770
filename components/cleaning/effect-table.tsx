"use client";

import { useMemo, useState } from "react";
import { effectRows, type EffectRow } from "@/components/cleaning/effect-rows";
import { DataTable, type DataColumn } from "@/components/ui/data-table";
import { SelectField } from "@/components/ui/form-field";
import { useUnits } from "@/components/units/use-units";
import { channelWords } from "@/lib/legend/channel-words";
import type { CleaningEffect } from "@/lib/schemas/cleaning";
import { formatQuantity } from "@/lib/units/format-quantity";

const ALL = "";

/** Margin, where there is one: what a seeding log is judged by. */
function firstChannel(effects: readonly CleaningEffect[]): string {
  const channels = effects.map(({ channel }) => channel);
  return channels.find((channel) => channel === "margin") ?? channels[0] ?? ALL;
}

export interface EffectTableProps {
  effects: CleaningEffect[];
  logName: string;
  isDraft: boolean;
}

/** What the rules do to the numbers of each channel. */
export function EffectTable({ effects, logName, isDraft }: EffectTableProps) {
  const { system } = useUnits();
  const [channel, setChannel] = useState(() => firstChannel(effects));
  const rows = useMemo(
    () => effectRows(channel === ALL ? effects : effects.filter((effect) => effect.channel === channel), system),
    [effects, channel, system],
  );
  const columns = useMemo(() => effectColumns(isDraft, channel === ALL), [isDraft, channel]);
  return (
    <section aria-labelledby="effect-title" className="space-y-3">
      <h2 id="effect-title" className="text-section">
        What that does to the numbers
      </h2>
      <p className="max-w-prose text-table text-ink-soft">
        All readings in passes, each weighted by the distance its row travelled.
      </p>
      <SelectField
        label="Reading"
        className="max-w-xs"
        value={channel}
        onChange={(event) => setChannel(event.target.value)}
      >
        {effects.map((effect) => (
          <option key={effect.channel} value={effect.channel}>
            {channelWords(effect.channel).name}
          </option>
        ))}
        <option value={ALL}>All of them</option>
      </SelectField>
      <DataTable
        caption="Each measure as logged and with the rules"
        rows={rows}
        columns={columns}
        rowId={(row) => row.id}
        fileName={`cleaning-${logName.replaceAll(/[^\w]+/g, "-")}`}
      />
    </section>
  );
}

function sayChange(share: number | undefined): string {
  const { text } = formatQuantity(share ?? null, "fraction", "metric", { decimals: 1 });
  return (share ?? 0) >= 0.0005 ? `+${text}` : text;
}

function effectColumns(isDraft: boolean, withChannel: boolean): DataColumn<EffectRow>[] {
  return [
    { id: "measure", header: "Measure", value: (row) => row.measure },
    { id: "channel", header: "Reading", value: (row) => row.channel, fileOnly: !withChannel },
    { id: "unit", header: "Unit", value: (row) => row.unit, fileOnly: true },
    {
      id: "asLogged",
      header: "As logged",
      numeric: true,
      value: (row) => row.asLogged,
      cell: (row) => row.words.asLogged,
    },
    {
      id: "cleaned",
      header: isDraft ? "With these rules" : "With the rules",
      numeric: true,
      value: (row) => row.cleaned,
      cell: (row) => row.words.cleaned,
    },
    { id: "change", header: "Change", numeric: true, value: (row) => row.change, cell: (row) => row.words.change },
    {
      id: "changeShare",
      header: "Change, % of as logged",
      numeric: true,
      value: (row) => (row.changeShare === undefined ? undefined : Number((row.changeShare * 100).toPrecision(6))),
      cell: (row) => sayChange(row.changeShare),
    },
  ];
}
