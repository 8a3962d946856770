import { MEASURE_WORDS, TOLD_WORDS } from "@/components/compare-logs/say-comparison";
import type { DataColumn } from "@/components/ui/data-table";
import type { ComparedMeasure, ComparedRow, ComparisonBody } from "@/lib/schemas/comparison";
import { displayUnit, type UnitSystem } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

interface NumberColumn<Row> {
  id: string;
  header: string;
  of: (row: Row) => number | null | undefined;
  wideOnly?: boolean;
  fileOnly?: boolean;
}

interface Shown {
  unit: string;
  channel: string;
  system: UnitSystem;
}

/** A column of numbers in the person's unit, which stands in the header. */
function numberColumn<Row>({ of, header, ...column }: NumberColumn<Row>, shown: Shown): DataColumn<Row> {
  const { symbol, factor } = displayUnit(shown.unit, shown.system, shown.channel);
  return {
    ...column,
    header: symbol ? `${header}, ${symbol}` : header,
    numeric: true,
    value: (row) => {
      const value = of(row);
      return value == null ? undefined : Number((value / factor).toPrecision(7));
    },
    cell: (row) => {
      const { text, unit } = formatQuantity(of(row) ?? null, shown.unit, shown.system, { channel: shown.channel });
      return unit !== "" && text.endsWith(unit) ? text.slice(0, -unit.length).trim() : text;
    },
  };
}

/** Columns of the rows of a comparison in a person's units. */
export function comparedRowColumns(
  { channel, unit, rows }: ComparisonBody,
  system: UnitSystem,
): DataColumn<ComparedRow>[] {
  const own = { unit, channel, system };
  const share = { unit: "fraction", channel: "", system };
  const number = (column: NumberColumn<ComparedRow>) => numberColumn(column, own);
  const shareOf = (column: NumberColumn<ComparedRow>) =>
    rows.some((row) => column.of(row) != null) ? [numberColumn(column, share)] : [];
  return [
    { id: "row", header: "Row", value: ({ row }) => row, numeric: true },
    number({ id: "before", header: "Mean before", of: ({ before }) => before.mean, wideOnly: true }),
    number({ id: "after", header: "Mean after", of: ({ after }) => after.mean, wideOnly: true }),
    number({ id: "difference", header: "Difference", of: ({ difference }) => difference }),
    number({ id: "low", header: "95 % from", of: ({ interval }) => interval?.[0], wideOnly: true }),
    number({ id: "high", header: "95 % to", of: ({ interval }) => interval?.[1], wideOnly: true }),
    number({ id: "beyond", header: "Beyond the other rows", of: ({ beyondOthers }) => beyondOthers }),
    number({
      id: "beyond-low",
      header: "95 % of all rows from",
      of: ({ beyondInterval }) => beyondInterval?.[0],
      wideOnly: true,
    }),
    number({
      id: "beyond-high",
      header: "95 % of all rows to",
      of: ({ beyondInterval }) => beyondInterval?.[1],
      wideOnly: true,
    }),
    { id: "told", header: "Beyond the others", value: ({ told }) => TOLD_WORDS[told] },
    ...shareOf({
      id: "under-before",
      header: "Under target before",
      of: ({ before }) => before.shareUnderTarget,
      wideOnly: true,
    }),
    ...shareOf({
      id: "under-after",
      header: "Under target after",
      of: ({ after }) => after.shareUnderTarget,
      wideOnly: true,
    }),
    ...shareOf({
      id: "limit-before",
      header: "At the limit before",
      of: ({ before }) => before.shareAtLimit,
      wideOnly: true,
    }),
    ...shareOf({
      id: "limit-after",
      header: "At the limit after",
      of: ({ after }) => after.shareAtLimit,
      wideOnly: true,
    }),
    ...(["p05", "p25", "p50", "p75", "p95"] as const).flatMap((level) => [
      number({
        id: `${level}-before`,
        header: `${PERCENTILES[level]} before`,
        of: ({ before }) => before[level],
        fileOnly: true,
      }),
      number({
        id: `${level}-after`,
        header: `${PERCENTILES[level]} after`,
        of: ({ after }) => after[level],
        fileOnly: true,
      }),
    ]),
  ];
}

const PERCENTILES = {
  p05: "5th percentile",
  p25: "25th percentile",
  p50: "Median",
  p75: "75th percentile",
  p95: "95th percentile",
} as const;

/** Columns of all rows together: measures have different units, so each number carries its own. */
export function measureColumns(channel: string, system: UnitSystem): DataColumn<ComparedMeasure>[] {
  const column = (
    id: string,
    header: string,
    of: (measure: ComparedMeasure) => number | null | undefined,
  ): DataColumn<ComparedMeasure> => ({
    id,
    header,
    numeric: true,
    value: (measure) => {
      const value = of(measure);
      const { factor } = displayUnit(measure.unit, system, channel);
      return value == null ? undefined : Number((value / factor).toPrecision(7));
    },
    cell: (measure) => formatQuantity(of(measure) ?? null, measure.unit, system, { channel }).text,
  });
  return [
    { id: "measure", header: "All rows together", value: ({ measure }) => MEASURE_WORDS[measure] },
    { id: "unit", header: "Unit", value: ({ unit }) => displayUnit(unit, system, channel).symbol, fileOnly: true },
    column("before", "Before", ({ before }) => before),
    column("after", "After", ({ after }) => after),
    column("difference", "Difference", ({ difference }) => difference),
    column("low", "95 % from", ({ interval }) => interval?.[0]),
    column("high", "95 % to", ({ interval }) => interval?.[1]),
    { id: "told", header: "Told", value: ({ told }) => TOLD_WORDS[told] },
  ];
}
