import path from "node:path";
import { setImmediate } from "node:timers/promises";
import sqlite, { type SqliteDatabase } from "node-sqlite3-wasm";
import type { ExportAbout } from "@/lib/export/about";
import type { ExportBatch, ExportTable } from "@/lib/export/export-table";
import { geopackageRows, NO_BOUNDS, type Bounds } from "@/lib/export/geopackage/geopackage-rows";
import { GEOPACKAGE_PRAGMAS, geopackageTables, insertStatement } from "@/lib/export/geopackage/geopackage-tables";

/** Nobody else sees the file before it is whole: no journal, and its pages stay few. */
const BULK_PRAGMAS = "PRAGMA journal_mode = OFF; PRAGMA synchronous = OFF; PRAGMA cache_size = -8000;";

interface GeopackageInput {
  folder: string;
  table: ExportTable;
  batches: AsyncIterable<ExportBatch>;
  about: ExportAbout;
}

/** Writes a GeoPackage (OGC 12-128r17) of one layer and a table `about`; gives its path. */
export async function writeGeopackage({ folder, table, batches, about }: GeopackageInput): Promise<string> {
  const file = path.join(folder, "export.gpkg");
  const database = new sqlite.Database(file);
  try {
    database.exec(BULK_PRAGMAS + GEOPACKAGE_PRAGMAS);
    database.exec("BEGIN");
    database.exec(geopackageTables(table));
    const bounds: Bounds = [...NO_BOUNDS];
    const insert = database.prepare(insertStatement(table));
    try {
      for await (const batch of batches) {
        for (const values of geopackageRows(table, batch, bounds)) insert.run(values);
        await setImmediate();
      }
    } finally {
      insert.finalize();
    }
    writeAbout(database, about);
    if (bounds.every(Number.isFinite)) {
      const sql = "UPDATE gpkg_contents SET min_x = ?, min_y = ?, max_x = ?, max_y = ? WHERE table_name = ?";
      database.run(sql, [...bounds, table.level]);
    }
    database.run("UPDATE gpkg_contents SET last_change = ?", [about.madeAt]);
    database.exec("COMMIT");
  } finally {
    database.close();
  }
  return file;
}

function writeAbout(database: SqliteDatabase, about: ExportAbout): void {
  for (const [name, value] of Object.entries(about)) {
    const text = typeof value === "string" ? value : JSON.stringify(value);
    database.run("INSERT INTO about (name, value) VALUES (?, ?)", [name, text]);
  }
}
