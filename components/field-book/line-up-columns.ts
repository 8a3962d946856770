import { quantityColumn } from "@/components/field-book/quantity-column";
import { sayReason } from "@/components/field-book/say-reason";
import type { DataColumn } from "@/components/ui/data-table";
import type { RowStatisticsBody, RowStatisticsItem } from "@/lib/schemas/logs";
import type { UnitSystem } from "@/lib/units/display-unit";

type NumberField = {
  [Key in keyof RowStatisticsItem]-?: RowStatisticsItem[Key] extends number | null | undefined ? Key : never;
}[keyof RowStatisticsItem];

interface FieldColumn {
  field: NumberField;
  header: string;
  /** Unit of the field where it is not the channel's own. */
  unit?: string;
}

const FIELDS: FieldColumn[] = [
  { field: "n", header: "Readings", unit: "1" },
  { field: "distanceM", header: "Distance", unit: "m" },
  { field: "mean", header: "Mean" },
  { field: "sd", header: "Standard deviation" },
  { field: "min", header: "Least" },
  { field: "p05", header: "5th percentile" },
  { field: "p25", header: "25th percentile" },
  { field: "p50", header: "Median" },
  { field: "p75", header: "75th percentile" },
  { field: "p95", header: "95th percentile" },
  { field: "max", header: "Greatest" },
  { field: "shareUnderTarget", header: "Under target, of distance", unit: "fraction" },
  { field: "shareAtLimit", header: "At the limit, of distance", unit: "fraction" },
  { field: "shareContactLost", header: "Contact lost, of distance", unit: "fraction" },
  { field: "longestUnderTargetM", header: "Longest run under target", unit: "m" },
  { field: "deviation", header: "Typical difference from other rows" },
  { field: "deviationZ", header: "Difference from other rows, z", unit: "1" },
];

const DISTANCES: NumberField[] = ["distanceM", "longestUnderTargetM"];
const ON_PHONE: NumberField[] = ["p50", "shareUnderTarget", "shareAtLimit", "deviationZ"];

/** Columns of the line-up's table in a person's units. Numbers go into the file rounded to four figures beyond the shown ones. */
export function lineUpColumns(
  { channel, unit, items }: RowStatisticsBody,
  system: UnitSystem,
): DataColumn<RowStatisticsItem>[] {
  // What no row has, such as a share at the limit of a margin, would be a column of dashes.
  const filled = FIELDS.filter(
    ({ field }) => items.length === 0 || items.some((item) => (item[field] ?? null) !== null),
  );
  const numbers = filled.map(({ field, header, unit: own }) =>
    numberColumn({ field, header, unit: own ?? unit, channel, system }),
  );
  const why = ({ reason }: RowStatisticsItem) =>
    reason === null ? undefined : sayReason(reason, { unit, channel, system });
  return [
    { id: "row", header: "Row", value: (item) => item.row, numeric: true },
    { id: "flagged", header: "Stands out", value: (item) => (item.flagged ? "yes" : "no") },
    ...(items.some((item) => item.reason !== null)
      ? [{ id: "reason", header: "Why", value: (item: RowStatisticsItem) => why(item) }]
      : []),
    ...numbers,
  ];
}

interface NumberColumnOptions {
  field: NumberField;
  header: string;
  unit: string;
  channel: string;
  system: UnitSystem;
}

function numberColumn({ field, header, unit, channel, system }: NumberColumnOptions): DataColumn<RowStatisticsItem> {
  return quantityColumn({
    id: field,
    header,
    value: (item) => item[field],
    unit,
    // "m" of a depth is shown in millimetres, "m" of a distance is not.
    channel: DISTANCES.includes(field) ? "distance" : channel,
    system,
    decimals: field === "n" ? 0 : field === "deviationZ" ? 2 : undefined,
    onPhone: ON_PHONE.includes(field),
  });
}
