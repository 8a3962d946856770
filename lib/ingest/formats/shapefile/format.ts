import { chooseLayer, describeLayers, type InspectedLayer } from "@/lib/ingest/columns/choose-layer";
import { describeFoundColumns } from "@/lib/ingest/columns/describe-found-columns";
import { nameColumns } from "@/lib/ingest/columns/name-columns";
import { POINT_DEGREES, POINT_PLANE, SHAPE_AREA } from "@/lib/ingest/formats/point-columns";
import { groupParts, holdsShapefile, type ShapefileParts } from "@/lib/ingest/formats/shapefile/group-parts";
import {
  isDeleted,
  openDbf,
  readCellText,
  chooseEncoding,
  type DbfTable,
} from "@/lib/ingest/formats/shapefile/read-dbf";
import { readShp, type ShapePoints } from "@/lib/ingest/formats/shapefile/read-shp";
import type { ZipEntry } from "@/lib/ingest/formats/zip/list-entries";
import { unpackEntry, type ZipArchive } from "@/lib/ingest/formats/zip/open-zip";
import { stopReading } from "@/lib/ingest/ingest-error";
import {
  READ_LIMITS,
  type ArchivedFormat,
  type InspectOptions,
  type Inspection,
  type ReadLog,
  type ReadOptions,
} from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import { NoteBook } from "@/lib/ingest/records/note-book";
import { createToDegrees, lacksDatumShift, type ToDegrees } from "@/lib/ingest/records/project-position";
import { readNumberBytes } from "@/lib/ingest/records/read-number-bytes";
import { CELL, buildReadPlan } from "@/lib/ingest/records/read-plan";
import { RecordCollector } from "@/lib/ingest/records/record-collector";
import { squareMetres } from "@/lib/ingest/records/square-metres";

const SAMPLE_RECORDS = 600;
/** Of each part, for a look: the header of 20,000 fields and some records. */
const LOOK_BYTES = 2 * 1024 * 1024;
/** Of a .prj or .cpg. */
const TEXT_BYTES = 65_536;

/** Zipped shapefile: one shape a record; several layers to choose from. */
export const shapefileFormat: ArchivedFormat = {
  id: "shapefile",
  label: "Zipped shapefile",
  holds: holdsShapefile,
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
  isDegrees: boolean;
  notes: NoteBook;
}

/** One layer of an archive; with `maxBytes` only the beginnings of its parts, to look at. */
async function openLayer(archive: ZipArchive, parts: ShapefileParts, maxBytes = Infinity): Promise<Layer> {
  const { shp, dbf, prj, cpg } = parts;
  const readText = async (entry: ZipEntry | null) =>
    entry ? new TextDecoder().decode(await unpackEntry(archive, entry, TEXT_BYTES)) : null;
  const points = readShp(await unpackEntry(archive, shp, maxBytes), shp.name);
  const tableBytes = await unpackEntry(archive, dbf, maxBytes);
  const { encoding, isGuessed } = chooseEncoding(tableBytes, await readText(cpg));
  const table = openDbf(tableBytes, dbf.name, encoding);
  const records = Math.min(points.x.length, table.records);
  const notes = new NoteBook();
  if (isGuessed) notes.add("unknown-code-page");
  if (maxBytes === Infinity) {
    notes.set("part-count-mismatch", Math.max(points.x.length, table.stated, table.records) - records);
    if (points.isCutShort) notes.add("cut-short", points.x.length);
  }
  if (points.kind !== "point") notes.add(SHAPE_NOTES[points.kind]);
  const { toDegrees, isDegrees } = judgeProjection(await readText(prj), points, { name: archive.name, notes });
  const point = isDegrees ? POINT_DEGREES : POINT_PLANE;
  const ofShape = points.area ? [SHAPE_AREA] : [];
  const names = nameColumns([point.x, point.y, ...table.fields.map((field) => field.name), ...ofShape]);
  return { points, table, records, names, toDegrees, isDegrees, notes };
}

const SHAPE_NOTES = { points: "several-points", line: "line-midpoints", area: "area-centres" } as const;

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
  if (toDegrees && lacksDatumShift(prj)) notes.add("old-datum");
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

/** What a record's area covers; coordinates of an unknown plane are taken for metres. NaN for other shapes. */
function areaOf({ points, toDegrees, isDegrees }: Layer, record: number): number {
  const area = points.area?.[record] ?? NaN;
  const flat = { area, x: points.x[record] ?? NaN, y: points.y[record] ?? NaN };
  return isDegrees ? squareMetres(flat, toDegrees) : area;
}

async function inspectShapefile(archive: ZipArchive, options: InspectOptions): Promise<Inspection> {
  const { layers, bare } = groupParts(archive);
  const opened: (Layer & ShapefileParts)[] = [];
  for (const part of layers.slice(0, READ_LIMITS.layers)) {
    const layer = await openLayer(archive, part, LOOK_BYTES);
    if (layer.records > 0) opened.push({ ...part, ...layer });
  }
  if (opened.length === 0) stopWithoutRecords(archive);
  const inspected = opened.map((layer) => inspectLayer(layer, options));
  const { notes, ...described } = describeLayers(inspected);
  const firstId = described.layers?.[0]?.id;
  const shown = Math.max(0, firstId === undefined ? 0 : inspected.findIndex(({ id }) => id === firstId));
  const layer = opened[shown];
  layer?.notes.set("shapes-without-table", bare.length);
  return {
    format: "shapefile",
    ...described,
    encoding: layer?.table.decoder.encoding,
    recordsSampled: Math.min(layer?.records ?? 0, SAMPLE_RECORDS),
    notes: [...notes, ...(layer?.notes.list("record") ?? [])],
  };
}

function stopWithoutRecords({ name }: ZipArchive): never {
  stopReading("no-readings", `The shapefile in "${name}" holds no records. Export the log again.`);
}

function inspectLayer(layer: Layer & ShapefileParts, options: InspectOptions): InspectedLayer {
  const { id, label, table, names, notes } = layer;
  const count = Math.min(layer.records, SAMPLE_RECORDS);
  const sampled = Array.from({ length: count }, (_, record) => record).filter((record) => !isDeleted(table, record));
  const cells = (field: number): string[] => {
    if (field < 2) return sampled.map((record) => coordinateText(pointOf(layer, record)[field]));
    const column = table.fields[field - 2];
    if (!column && layer.points.area) return sampled.map((record) => coordinateText(areaOf(layer, record)));
    return column ? sampled.map((record) => readCellText(table, record, column)) : [];
  };
  const found = describeFoundColumns({ names, units: null, cells, decimalComma: false, near: options.near, notes });
  return { id, label, records: table.stated, ...found };
}

function coordinateText(value: number | undefined): string {
  return value === undefined || Number.isNaN(value) ? "" : String(value);
}

async function readShapefile(archive: ZipArchive, mapping: LogMapping, options: ReadOptions): Promise<ReadLog> {
  const layer = await openLayer(archive, chooseLayer(groupParts(archive).layers, mapping.layer, archive.name));
  if (layer.records === 0) stopWithoutRecords(archive);
  const { table, names, records } = layer;
  const plan = buildReadPlan(mapping, names);
  const collector = new RecordCollector(plan, { expectedLines: records, place: "record" });
  const used = table.fields.flatMap((column, index) => {
    const kind = plan.kinds[index + 2] ?? CELL.skip;
    return kind === CELL.skip ? [] : [{ column, field: index + 2, kind }];
  });
  const areaField = table.fields.length + 2;
  const wantsArea = layer.points.area !== null && plan.kinds[areaField] !== CELL.skip;
  for (let record = 0; record < records; record++) {
    if (record % 4096 === 0 && options.signal?.aborted) {
      stopReading("cancelled", `Reading "${archive.name}" was cancelled.`);
    }
    if (isDeleted(table, record)) {
      collector.notes.add("deleted-records", record + 1);
      continue;
    }
    const [x, y] = pointOf(layer, record);
    collector.line[0] = x;
    collector.line[1] = y;
    if (wantsArea) collector.line[areaField] = areaOf(layer, record);
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
