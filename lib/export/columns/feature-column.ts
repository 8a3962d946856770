import type { ExportBatch, ExportColumn, ExportTable } from "@/lib/export/export-table";
import { newCells } from "@/lib/export/export-table";
import type { MultiPolygon, Polygon } from "geojson";

/** A column of a table of polygons, read from what is known of each. */
export interface FeatureColumn<Facts> extends ExportColumn {
  read: (facts: Facts) => number | string | null;
}

export interface FeatureTable<Facts> extends ExportTable {
  columns: readonly FeatureColumn<Facts>[];
}

/** Polygons with their facts as one batch. */
export function featureBatch<Facts>(
  columns: readonly FeatureColumn<Facts>[],
  features: readonly { geometry: Polygon | MultiPolygon; facts: Facts }[],
): ExportBatch {
  const cells = columns.map((column) => {
    const into = newCells(column.kind, features.length);
    features.forEach(({ facts }, at) => {
      const value = column.read(facts);
      into[at] = (into instanceof Array ? value : (value ?? NaN)) as never;
    });
    return into;
  });
  return { rows: features.length, cells, polygons: features.map((feature) => feature.geometry) };
}
