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
export function comparedRowColumns(body: ComparisonBody, system: UnitSystem): DataColumn<ComparedRow>[] {
  const own = { unit: body.unit, channel: body.channel, system };
  const number = (column: NumberColumn<ComparedRow>) => numberColumn(column, own);
  const wide = { wideOnly: true };
  return [
    { id: "row", header: "Row", value: ({ row }) => row, numeric: true },
    number({ id: "before", header: "Mean before", of: ({ before }) => before.mean, ...wide }),
    number({ id: "after", header: "Mean after", of: ({ after }) => after.mean, ...wide }),
    number({ id: "difference", header: "Difference", of: ({ difference }) => difference }),
    number({ id: "low", header: "95 % from", of: ({ interval }) => interval?.[0], ...wide }),
    number({ id: "high", header: "95 % to", of: ({ interval }) => interval?.[1], ...wide }),
    number({ id: "beyond", header: "Beyond the other rows", of: (row) => row.beyondOthers }),
    number({ id: "beyond-low", header: "95 % of all rows from", of: (row) => row.beyondInterval?.[0], ...wide }),
    number({ id: "beyond-high", header: "95 % of all rows to", of: (row) => row.beyondInterval?.[1], ...wide }),
    { id: "told", header: "Beyond the others", value: ({ told }) => TOLD_WORDS[told] },
    ...shareColumns(body.rows, system),
    ...percentileColumns(own),
  ];
}

/** Shares of the distance, of those that the channel has. */
function shareColumns(rows: readonly ComparedRow[], system: UnitSystem): DataColumn<ComparedRow>[] {
  const shares: NumberColumn<ComparedRow>[] = [
    { id: "under-before", header: "Under target before", of: ({ before }) => before.shareUnderTarget },
    { id: "under-after", header: "Under target after", of: ({ after }) => after.shareUnderTarget },
    { id: "limit-before", header: "At the limit before", of: ({ before }) => before.shareAtLimit },
    { id: "limit-after", header: "At the limit after", of: ({ after }) => after.shareAtLimit },
  ];
  return shares
    .filter(({ of }) => rows.some((row) => of(row) != null))
    .map((column) => numberColumn({ ...column, wideOnly: true }, { unit: "fraction", channel: "", system }));
}

/** For the file: the screen shows them as boxes. */
function percentileColumns(own: Shown): DataColumn<ComparedRow>[] {
  return (["p05", "p25", "p50", "p75", "p95"] as const).flatMap((level) =>
    (["before", "after"] as const).map((side) =>
      numberColumn<ComparedRow>(
        {
          id: `${level}-${side}`,
          header: `${PERCENTILES[level]} ${side}`,
          of: (row) => row[side][level],
          fileOnly: true,
        },
        own,
      ),
    ),
  );
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
