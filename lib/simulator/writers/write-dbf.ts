import { DBF_END, dbfHeader, dbfRows, type DbfField } from "@/lib/export/shapefile/dbf";
import type { LogColumn } from "@/lib/simulator/writers/log-columns";

const NUMBER_WIDTH = 14;
const TEXT_WIDTH = 24;

/** Fixed, so the same log gives the same bytes. */
const CHANGED_ON = { year: 2026, month: 9, day: 24 };

/** A dBASE III table: fixed-width text, blanks where the log holds nothing. Names are 10 ASCII letters at most. */
export function writeDbf(records: number, columns: readonly LogColumn[]): Uint8Array {
  const fields = columns.map(({ name, decimals }): DbfField => ({
    name,
    type: decimals < 0 ? "C" : "N",
    width: decimals < 0 ? TEXT_WIDTH : NUMBER_WIDTH,
    decimals: Math.max(0, decimals),
  }));
  const header = dbfHeader(fields, records, CHANGED_ON);
  const rows = dbfRows(fields, records, (field, record) => columns[field]?.at(record) ?? null);
  const bytes = new Uint8Array(header.length + rows.length + DBF_END.length);
  bytes.set(header);
  bytes.set(rows, header.length);
  bytes.set(DBF_END, header.length + rows.length);
  return bytes;
}
