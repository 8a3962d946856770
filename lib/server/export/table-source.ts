import { readingsBatches, readingsTable, type ReadingsTable } from "@/lib/export/columns/readings-table";
import { swathsBatches, swathsTable } from "@/lib/export/columns/swaths-table";
import { wideReadingsTable } from "@/lib/export/columns/wide-readings-table";
import { zonesBatches, zonesTable } from "@/lib/export/columns/zones-table";
import type { ExportBatch, ExportTable, LogPart } from "@/lib/export/export-table";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { ExportQuery } from "@/lib/schemas/export";
import { loggedChannels } from "@/lib/server/logs/load-placed-log";

/** The table that was asked for and its rows for any part of the log. */
export interface TableSource {
  table: ExportTable;
  /** The same, where it is one of readings. */
  readings: ReadingsTable | null;
  batches: (part: LogPart) => Generator<ExportBatch>;
}

/** Names of the logged channels that an export needs. */
export function channelsOfExport({ level, channel }: ExportQuery): "all" | readonly string[] {
  if (level === "readings") return "all";
  return level === "zones" ? loggedChannels(channel ?? null) : [];
}

/** @throws AppError unprocessable where the log cannot give the zones asked for */
export function chooseTable(outline: PlacedLog, query: ExportQuery): TableSource {
  if (query.level === "zones") {
    const { channel = "", breaks = [], minLengthM } = query;
    const table = zonesTable(outline, { channel, breaks, minLengthM });
    return { table, readings: null, batches: (part) => zonesBatches(table, part) };
  }
  if (query.level === "swaths") {
    const table = swathsTable(outline.log.timeIsRelative);
    return { table, readings: null, batches: (part) => swathsBatches(table, part) };
  }
  const table = query.shape === "wide" ? wideReadingsTable(outline) : readingsTable(outline);
  return { table, readings: table, batches: (part) => readingsBatches(table, part) };
}
