import { zipSync } from "fflate";
import type { MachineLog } from "@/lib/logs/machine-log";
import { writeDbf } from "@/lib/simulator/writers/write-dbf";
import { FILE_STYLE_DEFAULTS, type FileStyle } from "@/lib/simulator/writers/file-style";
import { type LogColumn, wideColumns } from "@/lib/simulator/writers/log-columns";

const HEADER_BYTES = 100;
const POINT_SHAPE = 1;
const POINT_CONTENT_BYTES = 20;
/** Fixed, so the same log gives the same bytes. */
const ZIP_TIME = new Date("2026-09-24T12:00:00");

const WGS84_WKT =
  'GEOGCS["GCS_WGS_1984",DATUM["D_WGS_1984",SPHEROID["WGS_1984",6378137.0,298.257223563]],' +
  'PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]]';

/**
 * A zipped point shapefile: `<name>.shp/.shx/.dbf/.prj/.cpg`. Field names follow the `short` style (10 letters are all the
 * format allows); a record without a position becomes a null shape.
 */
export function writeShapefileZip(log: MachineLog, name: string, input: Partial<FileStyle> = {}): Uint8Array {
  const style: FileStyle = { ...FILE_STYLE_DEFAULTS, ...input, naming: "short" };
  const columns = wideColumns(log, style);
  const [, longitude, latitude] = columns;
  const fields = columns.filter((column) => column !== longitude && column !== latitude);
  const { shp, shx } = writePoints(log);
  const text = new TextEncoder();
  const files = {
    [`${name}.shp`]: shp,
    [`${name}.shx`]: shx,
    [`${name}.dbf`]: writeDbf(log.records, fields.map(shortenName)),
    [`${name}.prj`]: text.encode(WGS84_WKT),
    [`${name}.cpg`]: text.encode("UTF-8"),
  };
  return zipSync(files, { mtime: ZIP_TIME, level: 9 });
}

function shortenName(column: LogColumn): LogColumn {
  return { ...column, name: column.name.slice(0, 10) };
}

/** Main file and index of a point shapefile (public shapefile description of 1998): big-endian lengths, little-endian shapes. */
function writePoints(log: MachineLog): { shp: Uint8Array; shx: Uint8Array } {
  const isPlaced = (record: number): boolean => !Number.isNaN(log.longitude[record] ?? NaN);
  const contentBytes = Array.from({ length: log.records }, (_, record) => (isPlaced(record) ? POINT_CONTENT_BYTES : 4));
  const shp = new DataView(new ArrayBuffer(HEADER_BYTES + contentBytes.reduce((sum, bytes) => sum + 8 + bytes, 0)));
  const shx = new DataView(new ArrayBuffer(HEADER_BYTES + 8 * log.records));
  writeHeader(shp, log);
  writeHeader(shx, log);
  let at = HEADER_BYTES;
  contentBytes.forEach((bytes, record) => {
    shx.setInt32(HEADER_BYTES + 8 * record, at / 2);
    shx.setInt32(HEADER_BYTES + 8 * record + 4, bytes / 2);
    shp.setInt32(at, record + 1);
    shp.setInt32(at + 4, bytes / 2);
    if (bytes === POINT_CONTENT_BYTES) {
      shp.setInt32(at + 8, POINT_SHAPE, true);
      shp.setFloat64(at + 12, log.longitude[record] ?? NaN, true);
      shp.setFloat64(at + 20, log.latitude[record] ?? NaN, true);
    }
    at += 8 + bytes;
  });
  return { shp: new Uint8Array(shp.buffer), shx: new Uint8Array(shx.buffer) };
}

function writeHeader(view: DataView, log: MachineLog): void {
  view.setInt32(0, 9994);
  view.setInt32(24, view.byteLength / 2);
  view.setInt32(28, 1000, true);
  view.setInt32(32, POINT_SHAPE, true);
  const bounds = [smallest(log.longitude), smallest(log.latitude), largest(log.longitude), largest(log.latitude)];
  bounds.forEach((bound, index) => view.setFloat64(36 + 8 * index, bound, true));
}

function smallest(values: Float64Array): number {
  return values.reduce((least, value) => (value < least ? value : least), Infinity);
}

function largest(values: Float64Array): number {
  return values.reduce((most, value) => (value > most ? value : most), -Infinity);
}
