import type { Inspection } from "@/lib/ingest/log-format";
import type { LogMapping, MappedColumn } from "@/lib/ingest/mapping";

/** The proposals as a mapping to start from: columns with an open unit are left out and named in `undecided`. */
export function proposeMapping(inspection: Inspection): { mapping: LogMapping; undecided: string[] } {
  const undecided: string[] = [];
  const columns: MappedColumn[] = [];
  for (const { name, proposal } of inspection.columns) {
    if (!proposal) continue;
    const { channel, row, unit, format, missing } = proposal;
    if (unit === null) undecided.push(name);
    else {
      columns.push({
        name,
        channel,
        ...(row === undefined ? {} : { row }),
        unit,
        ...(format ? { format } : {}),
        ...(missing ? { missing } : {}),
      });
    }
  }
  const { shape, crs } = inspection;
  return { mapping: { columns, shape, ...(crs === undefined ? {} : { crs }) }, undecided };
}
