import type { ExportTable } from "@/lib/export/export-table";
import { attributeColumns } from "@/lib/export/shapefile/attribute-fields";

/** "GPKG" and version 1.3 (OGC 12-128r17, requirement 2). */
export const GEOPACKAGE_PRAGMAS = "PRAGMA application_id = 1196444487; PRAGMA user_version = 10300;";

const WGS84_DEFINITION =
  'GEOGCS["WGS 84",DATUM["WGS_1984",SPHEROID["WGS 84",6378137,298.257223563,AUTHORITY["EPSG","7030"]],' +
  'AUTHORITY["EPSG","6326"]],PRIMEM["Greenwich",0,AUTHORITY["EPSG","8901"]],' +
  'UNIT["degree",0.0174532925199433,AUTHORITY["EPSG","9122"]],AUTHORITY["EPSG","4326"]]';

/** The tables every GeoPackage has (OGC 12-128r17, tables 20 to 22). */
const CORE_TABLES = `
CREATE TABLE gpkg_spatial_ref_sys (
  srs_name TEXT NOT NULL, srs_id INTEGER NOT NULL PRIMARY KEY, organization TEXT NOT NULL,
  organization_coordsys_id INTEGER NOT NULL, definition TEXT NOT NULL, description TEXT);
CREATE TABLE gpkg_contents (
  table_name TEXT NOT NULL PRIMARY KEY, data_type TEXT NOT NULL, identifier TEXT UNIQUE, description TEXT DEFAULT '',
  last_change DATETIME NOT NULL DEFAULT (strftime('%Y-%m-%dT%H:%M:%fZ','now')),
  min_x DOUBLE, min_y DOUBLE, max_x DOUBLE, max_y DOUBLE, srs_id INTEGER,
  CONSTRAINT fk_gc_r_srs_id FOREIGN KEY (srs_id) REFERENCES gpkg_spatial_ref_sys(srs_id));
CREATE TABLE gpkg_geometry_columns (
  table_name TEXT NOT NULL, column_name TEXT NOT NULL, geometry_type_name TEXT NOT NULL, srs_id INTEGER NOT NULL,
  z TINYINT NOT NULL, m TINYINT NOT NULL,
  CONSTRAINT pk_geom_cols PRIMARY KEY (table_name, column_name), CONSTRAINT uk_gc_table_name UNIQUE (table_name),
  CONSTRAINT fk_gc_tn FOREIGN KEY (table_name) REFERENCES gpkg_contents(table_name),
  CONSTRAINT fk_gc_srs FOREIGN KEY (srs_id) REFERENCES gpkg_spatial_ref_sys (srs_id));
INSERT INTO gpkg_spatial_ref_sys VALUES
  ('WGS 84', 4326, 'EPSG', 4326, '${WGS84_DEFINITION}', 'longitude and latitude on WGS 84'),
  ('Undefined Cartesian SRS', -1, 'NONE', -1, 'undefined', 'undefined Cartesian coordinate reference system'),
  ('Undefined geographic SRS', 0, 'NONE', 0, 'undefined', 'undefined geographic coordinate reference system');`;

const TYPES = { integer: "INTEGER", number: "REAL", float32: "REAL", text: "TEXT", time: "DATETIME" } as const;

export function quoteName(name: string): string {
  return `"${name.replaceAll('"', '""')}"`;
}

/** Statements that make an empty GeoPackage of one layer, named after the level, and a table `about` of names and values. */
export function geopackageTables(table: ExportTable): string {
  const columns = attributeColumns(table).map(({ column }) => `${quoteName(column.name)} ${TYPES[column.kind]}`);
  const geometryType = geometryTypeOf(table);
  return `${CORE_TABLES}
CREATE TABLE ${table.level} (fid INTEGER PRIMARY KEY AUTOINCREMENT NOT NULL, geom ${geometryType}, ${columns.join(", ")});
CREATE TABLE about (id INTEGER PRIMARY KEY AUTOINCREMENT NOT NULL, name TEXT NOT NULL, value TEXT NOT NULL);
INSERT INTO gpkg_contents (table_name, data_type, identifier, srs_id) VALUES
  ('${table.level}', 'features', '${table.level}', 4326), ('about', 'attributes', 'about', NULL);
INSERT INTO gpkg_geometry_columns VALUES ('${table.level}', 'geom', '${geometryType}', 4326, 0, 0);`;
}

function geometryTypeOf({ geometry }: ExportTable): "POINT" | "MULTIPOLYGON" {
  return geometry === "point" ? "POINT" : "MULTIPOLYGON";
}

/** Statement that takes the geometry, then the attributes, of one row. */
export function insertStatement(table: ExportTable): string {
  const names = attributeColumns(table).map(({ column }) => quoteName(column.name));
  const places = Array.from({ length: names.length + 1 }, () => "?").join(", ");
  return `INSERT INTO ${table.level} (geom, ${names.join(", ")}) VALUES (${places})`;
}
