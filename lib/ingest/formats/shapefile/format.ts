import type { ByteSource } from "@/lib/ingest/byte-source";
import { describeFoundColumns } from "@/lib/ingest/columns/describe-found-columns";
import { nameColumns } from "@/lib/ingest/columns/name-columns";
import { POINT_DEGREES, POINT_PLANE } from "@/lib/ingest/formats/point-columns";
import { groupParts } from "@/lib/ingest/formats/shapefile/group-parts";
import type { ZipEntry } from "@/lib/ingest/formats/shapefile/list-entries";
import { isZip, openZip, unpackEntry } from "@/lib/ingest/formats/shapefile/open-zip";
import { isDeleted, openDbf, readCellText, readCodePage, type DbfTable } from "@/lib/ingest/formats/shapefile/read-dbf";
import { readShp, type ShapePoints } from "@/lib/ingest/formats/shapefile/read-shp";
import { stopReading } from "@/lib/ingest/ingest-error";
import type { InspectOptions, Inspection, LogFormat, ReadLog, ReadOptions } from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import { openText } from "@/lib/ingest/open-text";
import { NoteBook } from "@/lib/ingest/records/note-book";
import { createToDegrees, type ToDegrees } from "@/lib/ingest/records/project-position";
import { readNumberBytes } from "@/lib/ingest/records/read-number-bytes";
import { CELL, buildReadPlan } from "@/lib/ingest/records/read-plan";
import { RecordCollector } from "@/lib/ingest/records/record-collector";

const SAMPLE_RECORDS = 600;
/** Of each part, for a look: the header of 20,000 fields and some records. */
const LOOK_BYTES = 2 * 1024 * 1024;
/** Of a .prj or .cpg. */
const TEXT_BYTES = 65_536;

/** A zipped point shapefile: one point a record. */
export const shapefileFormat: LogFormat = {
  id: "shapefile",
  label: "Zipped point shapefile",
  extensions: [".zip"],
  looksLike: (head) => isZip(head),
  inspect: inspectShapefile,
  read: readShapefile,
};

interface Layer {
  points: ShapePoints;
  table: DbfTable;
  records: number;
  names: string[];
  /** From the coordinates to degrees by the .prj; null where they are degrees, or nobody said what they are. */
  toDegrees: ToDegrees | null;
  notes: NoteBook;
}

/** The layer of an archive; with `maxBytes` only the beginnings of its parts, to look at. */
async function openLayer(source: ByteSource, options: ReadOptions, maxBytes = Infinity): Promise<Layer> {
  const archive = await openZip(openText(source, options));
  const { shp, dbf, prj, cpg } = groupParts(archive);
  const readText = async (entry: ZipEntry | null) =>
    entry ? new TextDecoder().decode(await unpackEntry(archive, entry, TEXT_BYTES)) : null;
  const points = readShp(await unpackEntry(archive, shp, maxBytes), shp.name);
  const encoding = readCodePage((await readText(cpg)) ?? "");
  const table = openDbf(await unpackEntry(archive, dbf, maxBytes), dbf.name, encoding);
  const records = Math.min(points.x.length, table.records);
  const notes = new NoteBook();
  if (maxBytes === Infinity) {
    notes.set("part-count-mismatch", Math.max(points.x.length, table.stated, table.records) - records);
    if (points.isCutShort) notes.add("cut-short", points.x.length);
  }
  if (records === 0) {
    stopReading("no-readings", `The shapefile in "${source.name}" holds no records. Export the log again.`);
  }
  const { toDegrees, isDegrees } = judgeProjection(await readText(prj), points, {
    name: source.name,
    notes,
  });
  const point = isDegrees ? POINT_DEGREES : POINT_PLANE;
  const names = nameColumns([point.x, point.y, ...table.fields.map((field) => field.name)]);
  return { points, table, records, names, toDegrees, notes };
}

/** Degrees by the .prj, or by the look of the numbers where there is none (with a note). */
function judgeProjection(
  prj: string | null,
  points: ShapePoints,
  { name, notes }: { name: string; notes: NoteBook },
): { toDegrees: ToDegrees | null; isDegrees: boolean } {
  if (prj === null || prj.trim() === "") {
    const isDegrees = points.x.every((x, i) => !(Math.abs(x) > 180) && !(Math.abs(points.y[i] ?? 0) > 180));
    if (isDegrees) notes.add("no-projection");
    return { toDegrees: null, isDegrees };
  }
  if (/^\s*GEOG(?:CS|CRS)\b/i.test(prj) && /WGS_?\s?(?:19)?84/i.test(prj)) return { toDegrees: null, isDegrees: true };
  const toDegrees = createToDegrees(prj);
  if (toDegrees) return { toDegrees, isDegrees: true };
  return stopReading(
    "unknown-projection",
    `The .prj in "${name}" names a coordinate system this program cannot read ("${prj.trim().slice(0, 60)}"). Export the log in WGS 84 (EPSG:4326) or UTM.`,
  );
}

function pointOf({ points, toDegrees }: Layer, record: number): [x: number, y: number] {
  const x = points.x[record] ?? NaN;
  const y = points.y[record] ?? NaN;
  return toDegrees ? toDegrees(x, y) : [x, y];
}

async function inspectShapefile(source: ByteSource, options: InspectOptions): Promise<Inspection> {
  const layer = await openLayer(source, options, LOOK_BYTES);
  const { table, names, notes } = layer;
  const count = Math.min(layer.records, SAMPLE_RECORDS);
  const sampled = Array.from({ length: count }, (_, record) => record).filter((record) => !isDeleted(table, record));
  const cells = (field: number): string[] => {
    if (field < 2) return sampled.map((record) => coordinateText(pointOf(layer, record)[field]));
    const column = table.fields[field - 2];
    return column ? sampled.map((record) => readCellText(table, record, column)) : [];
  };
  const found = describeFoundColumns({ names, units: null, cells, decimalComma: false, near: options.near, notes });
  return {
    format: "shapefile",
    shape: found.shape,
    encoding: table.decoder.encoding,
    columns: found.columns,
    recordsSampled: sampled.length,
    notes: notes.list("record"),
  };
}

function coordinateText(value: number | undefined): string {
  return value === undefined || Number.isNaN(value) ? "" : String(value);
}

async function readShapefile(source: ByteSource, mapping: LogMapping, options: ReadOptions): Promise<ReadLog> {
  const layer = await openLayer(source, options);
  const { table, names, records } = layer;
  const plan = buildReadPlan(mapping, names);
  const collector = new RecordCollector(plan, { expectedLines: records, place: "record" });
  const used = table.fields.flatMap((column, index) => {
    const kind = plan.kinds[index + 2] ?? CELL.skip;
    return kind === CELL.skip ? [] : [{ column, field: index + 2, kind }];
  });
  for (let record = 0; record < records; record++) {
    if (isDeleted(table, record)) {
      collector.notes.add("deleted-records", record + 1);
      continue;
    }
    const [x, y] = pointOf(layer, record);
    collector.line[0] = x;
    collector.line[1] = y;
    const recordStart = table.firstByte + record * table.recordBytes;
    for (const { column, field, kind } of used) {
      const start = recordStart + column.offset;
      const value = kind === CELL.number ? readNumberBytes(table.bytes, start, start + column.length) : NaN;
      if (value === value) collector.line[field] = value;
      else collector.takeText(field, readCellText(table, record, column), record + 1);
    }
    collector.commit(record + 1);
  }
  const { log, notes } = collector.finish();
  return { log, notes: [...layer.notes.list("record"), ...notes] };
}
