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

/** Bytes of a row and of each reading in it, measured on the fixture log of eight rows; zips by what deflate leaves. */
const BYTES: Record<ExportFormat, { aRow: number; aReading: number }> = {
  csv: { aRow: 92, aReading: 6 },
  geojson: { aRow: 268, aReading: 24 },
  shapefile: { aRow: 20, aReading: 3 },
  geopackage: { aRow: 105, aReading: 8 },
  arrow: { aRow: 64, aReading: 4 },
};
const ZIPPED_SHARE = 0.22;

/** Roughly how large an export of readings will be. */
export function estimateReadingsBytes({ format, shape, isBundle, records, rows, channels }: SizeInput): number {
  const perRow = channels.filter((channel) => channel.perRow).length;
  const { aRow, aReading } = BYTES[format];
  const hasRows = perRow > 0;
  const whole =
    shape === "wide"
      ? records * (aRow + 50 + aReading * (perRow * rows + channels.length - perRow))
      : records * (hasRows ? rows : 1) * (aRow + aReading * (channels.length + 1));
  return isBundle && format === "csv" ? whole * ZIPPED_SHARE : whole;
}
