import { zipSync } from "fflate";
import { ShapeEncoder, WGS84_WKT } from "@/lib/export/shapefile/shape-encoder";
import type { MachineLog } from "@/lib/logs/machine-log";
import { writeDbf } from "@/lib/simulator/writers/write-dbf";
import { FILE_STYLE_DEFAULTS, type FileStyle } from "@/lib/simulator/writers/file-style";
import { type LogColumn, wideColumns } from "@/lib/simulator/writers/log-columns";

/** Fixed, so the same log gives the same bytes. */
const ZIP_TIME = new Date("2026-09-24T12:00:00");

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

function writePoints(log: MachineLog): { shp: Uint8Array; shx: Uint8Array } {
  const encoder = new ShapeEncoder("point");
  const body = encoder.addPoints(log.records, log.longitude, log.latitude);
  const head = encoder.headers();
  return { shp: join(head.shp, body.shp), shx: join(head.shx, body.shx) };
}

function join(head: Uint8Array, body: Uint8Array): Uint8Array {
  const bytes = new Uint8Array(head.length + body.length);
  bytes.set(head);
  bytes.set(body, head.length);
  return bytes;
}
