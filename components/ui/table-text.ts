import type { DataColumn } from "@/components/ui/data-table";

/** A table as tab-separated text, for pasting into a sheet. */
export function tableText<Row>(columns: readonly DataColumn<Row>[], rows: readonly Row[]): string {
  const head = columns.map((column) => column.header).join("\t");
  const lines = rows.map((row) => columns.map((column) => guarded(column.value(row))).join("\t"));
  return [head, ...lines].join("\n");
}

/** Text that a sheet would run as a formula gets an apostrophe before it. */
function guarded(value: string | number | undefined): string {
  if (value === undefined) return "";
  if (typeof value === "number") return String(value);
  const plain = value.replaceAll(/[\t\r\n]/g, " ");
  return /^[=+\-@]/.test(plain) ? `'${plain}` : plain;
}
