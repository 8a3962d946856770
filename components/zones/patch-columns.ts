import { quantityColumn } from "@/components/field-book/quantity-column";
import type { DataColumn } from "@/components/ui/data-table";
import { sayRows } from "@/components/zones/zone-words";
import type { LimitZonesBody, ZonePatch } from "@/lib/schemas/limit-zones";
import type { UnitSystem } from "@/lib/units/display-unit";
import { channelWords } from "@/lib/legend/channel-words";

/** Columns of patches in a person's units; what has no room in the panel goes into the file. */
export function patchColumns({ channel, unit }: LimitZonesBody, system: UnitSystem): DataColumn<ZonePatch>[] {
  const length = { unit: "m", channel: "distance", system };
  const area = { unit: "m2", channel: "distance", system };
  return [
    { id: "rows", header: "Rows", value: sayRows },
    { id: "pass", header: "Pass", value: ({ pass }) => pass, numeric: true },
    quantityColumn({
      id: "length",
      header: "Length",
      value: ({ lengthM }: ZonePatch) => lengthM,
      onPhone: true,
      ...length,
    }),
    quantityColumn({
      id: "area",
      header: "Area",
      value: ({ areaM2 }: ZonePatch) => areaM2,
      decimals: 3,
      onPhone: true,
      ...area,
    }),
    {
      ...quantityColumn({
        id: "share",
        header: "Share of worked ground",
        value: ({ shareOfWorked }: ZonePatch) => shareOfWorked,
        unit: "fraction",
        channel: "distance",
        system,
      }),
      fileOnly: true,
    },
    { id: "first-row", header: "First row", value: ({ firstRow }) => firstRow, numeric: true, fileOnly: true },
    { id: "last-row", header: "Last row", value: ({ lastRow }) => lastRow, numeric: true, fileOnly: true },
    {
      ...quantityColumn({
        id: "from",
        header: "From, along the pass",
        value: ({ fromM }: ZonePatch) => fromM,
        ...length,
      }),
      fileOnly: true,
    },
    {
      ...quantityColumn({ id: "to", header: "To, along the pass", value: ({ toM }: ZonePatch) => toM, ...length }),
      fileOnly: true,
    },
    {
      ...quantityColumn({
        id: "mean",
        header: `${channelWords(channel).name}, mean`,
        value: ({ mean }: ZonePatch) => mean,
        unit,
        channel,
        system,
      }),
      fileOnly: true,
    },
  ];
}
