import type { ExportFormat, ExportLevel, ExportShape } from "@/lib/export/export-table";

export interface ExportChoice {
  format: ExportFormat;
  level: ExportLevel;
  shape?: ExportShape;
  /** Class edges in SI, for zones. */
  zones?: { channel: string; edges: readonly number[] };
  /** False: the log as it was read, without its cleaning rules. */
  cleaned?: boolean;
}

/** Address of an export; CSV comes zipped, with its notes. */
export function exportPath(logId: string, { format, level, shape, zones, cleaned = true }: ExportChoice): string {
  const query = new URLSearchParams({ format, level });
  if (shape === "wide") query.set("shape", shape);
  if (format === "csv") query.set("bundle", "zip");
  if (zones) {
    query.set("channel", zones.channel);
    query.set("breaks", zones.edges.join(","));
  }
  if (!cleaned) query.set("cleaned", "false");
  return `/api/v1/logs/${logId}/export?${query}`;
}
