import type { ExportFormat, ExportShape } from "@/lib/export/export-table";

export interface SizeInput {
  format: ExportFormat;
  shape: ExportShape;
  /** With README: CSV comes zipped. */
  isBundle: boolean;
  records: number;
  rows: number;
  channels: readonly { perRow: boolean }[];
}

/** Bytes of a line and of each reading in it, measured on logs of 8 and 48 rows. */
const BYTES: Record<ExportFormat, { aLine: number; aReading: number }> = {
  csv: { aLine: 100, aReading: 5.5 },
  geojson: { aLine: 280, aReading: 22 },
  // Zipped.
  shapefile: { aLine: 16, aReading: 3 },
  geopackage: { aLine: 120, aReading: 8 },
  arrow: { aLine: 78, aReading: 4.2 },
};

/** What packing leaves of CSV: a long one says the same of a record in every row's line. */
const ZIPPED_SHARE: Record<ExportShape, number> = { long: 0.15, wide: 0.35 };

/** Roughly how large an export of readings will be. */
export function estimateReadingsBytes({ format, shape, isBundle, records, rows, channels }: SizeInput): number {
  const perRow = channels.filter((channel) => channel.perRow).length;
  const linesARecord = shape === "long" && perRow > 0 ? rows : 1;
  const readingsALine = shape === "long" ? channels.length : perRow * rows + channels.length - perRow;
  const { aLine, aReading } = BYTES[format];
  const whole = records * linesARecord * (aLine + aReading * readingsALine);
  return isBundle && format === "csv" ? whole * ZIPPED_SHARE[shape] : whole;
}
