import { quantityColumn } from "@/components/field-book/quantity-column";
import type { DataColumn } from "@/components/ui/data-table";
import { rowsInWords, type RowGroup } from "@/lib/statistics/group-rows";
import type { UnitSystem } from "@/lib/units/display-unit";

interface GroupTable {
  groups: readonly RowGroup[];
  unit: string;
  channel: string;
  system: UnitSystem;
}

/** Columns of wings, sections and wheel tracks; shares only where a group has one. */
export function groupColumns({ groups, unit, channel, system }: GroupTable): DataColumn<RowGroup>[] {
  const shares = (
    [
      ["shareUnderTarget", "Under target, of distance"],
      ["shareAtLimit", "At the limit, of distance"],
      ["shareContactLost", "Contact lost, of distance"],
    ] as const
  ).filter(([field]) => groups.some((group) => group[field] !== null));
  const of = { unit, channel, system };
  return [
    {
      id: "words",
      header: "Part of the machine",
      value: ({ words }) => words.charAt(0).toUpperCase() + words.slice(1),
    },
    { id: "rows", header: "Rows", value: ({ rows }) => rowsInWords(rows) },
    quantityColumn({
      id: "distanceM",
      header: "Distance",
      value: (group) => group.distanceM,
      unit: "m",
      channel: "distance",
      system,
    }),
    quantityColumn({ ...of, id: "mean", header: "Mean", value: (group) => group.mean, onPhone: true }),
    quantityColumn({ ...of, id: "p50", header: "Median of rows", value: (group) => group.p50, onPhone: true }),
    ...shares.map(([field, header]) =>
      quantityColumn<RowGroup>({
        id: field,
        header,
        value: (group) => group[field],
        unit: "fraction",
        channel: field,
        system,
        onPhone: true,
      }),
    ),
  ];
}
