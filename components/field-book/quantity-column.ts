import type { DataColumn } from "@/components/ui/data-table";
import { displayUnit, type UnitSystem } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

export interface QuantityColumn<Row> {
  id: string;
  header: string;
  /** In SI. */
  value: (row: Row) => number | null | undefined;
  unit: string;
  /** Tells a depth from a distance. */
  channel: string;
  system: UnitSystem;
  decimals?: number;
  /** Kept on a phone's cards. */
  onPhone?: boolean;
}

/** A column of numbers in a person's units: rounded on the screen, seven figures in files. */
export function quantityColumn<Row>(given: QuantityColumn<Row>): DataColumn<Row> {
  const { id, header, unit, channel, system, decimals } = given;
  const { symbol, factor } = displayUnit(unit, system, channel);
  const options = decimals === undefined ? { channel } : { decimals, channel };
  return {
    id,
    header: symbol ? `${header}, ${symbol}` : header,
    numeric: true,
    wideOnly: given.onPhone !== true,
    value: (row) => {
      const value = given.value(row) ?? null;
      return value === null ? undefined : Number((value / factor).toPrecision(7));
    },
    cell: (row) => {
      const { text, unit: shown } = formatQuantity(given.value(row) ?? null, unit, system, options);
      // The number alone: its unit stands in the header.
      return shown === "" || !text.endsWith(shown) ? text : text.slice(0, -shown.length).trim();
    },
  };
}
