import { readHead, type ByteSource } from "@/lib/ingest/byte-source";
import { describeFoundColumns } from "@/lib/ingest/columns/describe-found-columns";
import { nameColumns } from "@/lib/ingest/columns/name-columns";
import { collectPaths, readProperty, type PropertyPath } from "@/lib/ingest/formats/geojson/flatten-properties";
import { FlatFeatureReader } from "@/lib/ingest/formats/geojson/scan-flat-feature";
import { parsePoint, readFeatureBytes, type PointFeature } from "@/lib/ingest/formats/geojson/read-features";
import { POINT_DEGREES, POINT_PLANE, SHAPE_AREA } from "@/lib/ingest/formats/point-columns";
import { stopReading } from "@/lib/ingest/ingest-error";
import {
  READ_LIMITS,
  type InspectOptions,
  type Inspection,
  type LogFormat,
  type ReadLog,
  type ReadOptions,
} from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import { openText } from "@/lib/ingest/open-text";
import { NoteBook } from "@/lib/ingest/records/note-book";
import { CELL, buildReadPlan } from "@/lib/ingest/records/read-plan";
import { createToDegrees } from "@/lib/ingest/records/project-position";
import { RecordCollector } from "@/lib/ingest/records/record-collector";
import { squareMetres } from "@/lib/ingest/records/square-metres";

const SAMPLE_FEATURES = 500;
const HEAD_BYTES = 65_536;

/** GeoJSON features (points; lines and areas by their middle), one a record, also as a text sequence; read feature by feature as the bytes arrive. */
export const geojsonFormat: LogFormat = {
  id: "geojson",
  label: "GeoJSON",
  extensions: [".geojson", ".json", ".geojson.gz", ".geojsonl", ".geojsons"],
  looksLike: (head) => /^\uFEFF?[\s\u001E]*[{[]/.test(new TextDecoder().decode(head.subarray(0, 256))),
  inspect: inspectGeojson,
  read: readGeojson,
};

interface FeatureLayout {
  features: PointFeature[];
  names: string[];
  /** Paths of the columns after the two of the geometry. */
  paths: PropertyPath[];
  crs: string | undefined;
  /** What a feature's area covers, m2; null where none of the first features is an area. */
  areaOf: ((feature: PointFeature) => number) | null;
}

/** Columns of the file by its first features: longitude and latitude of the point, then the properties. */
async function learnLayout(source: ByteSource): Promise<FeatureLayout> {
  const features: PointFeature[] = [];
  const crs = readNamedCrs(new TextDecoder().decode(await readHead(source, HEAD_BYTES)));
  for await (const block of readFeatureBytes(source)) {
    for (const feature of block.slice(0, SAMPLE_FEATURES - features.length)) features.push(parsePoint(feature));
    if (features.length >= SAMPLE_FEATURES) break;
  }
  if (features.length === 0) {
    stopReading("no-readings", `"${source.name}" is a FeatureCollection without features. Export the log again.`);
  }
  const paths = collectPaths(features.map((feature) => feature.properties));
  if (paths.length + 2 > READ_LIMITS.columns) {
    stopReading(
      "too-many-columns",
      `The features have ${paths.length} properties; a log may have 20,000. Export fewer channels.`,
    );
  }
  const point = crs === undefined ? POINT_DEGREES : POINT_PLANE;
  const areaOf = features.some(({ madeFrom }) => madeFrom === "area") ? measureAreas(crs) : null;
  const names = nameColumns([point.x, point.y, ...paths.map(({ name }) => name), ...(areaOf ? [SHAPE_AREA] : [])]);
  return { features, names, paths, crs, areaOf };
}

/** Coordinates that are no degrees, in a system nobody named, are taken for metres. */
function measureAreas(crs: string | undefined): (feature: PointFeature) => number {
  const toDegrees = crs === undefined ? null : createToDegrees(crs);
  return (feature) => {
    const isPlane = Math.abs(feature.x) > 180 || Math.abs(feature.y) > 90;
    return isPlane && !toDegrees ? feature.area : squareMetres(feature, toDegrees);
  };
}

/** The system named by a `crs` member of the 2008 GeoJSON draft (RFC 7946 dropped it) where it is not WGS 84. */
function readNamedCrs(head: string): string | undefined {
  const code = /"crs"\s*:\s*\{[^}]*"name"\s*:\s*"(?:urn:ogc:def:crs:)?EPSG:[\d.]*:?(\d{4,6})"/i.exec(head)?.[1];
  return code === undefined || code === "4326" ? undefined : `EPSG:${code}`;
}

async function inspectGeojson(source: ByteSource, options: InspectOptions): Promise<Inspection> {
  const { features, names, paths, crs, areaOf } = await learnLayout(openText(source, options));
  const notes = new NoteBook();
  for (const feature of features) noteGeometry(feature, notes);
  const cells = (field: number): string[] => {
    if (field < 2) return features.map((feature) => coordinateText(field === 0 ? feature.x : feature.y));
    const path = paths[field - 2];
    if (!path && areaOf) return features.map((feature) => coordinateText(areaOf(feature)));
    return path ? features.map((feature) => readProperty(feature.properties, path)) : [];
  };
  const found = describeFoundColumns({
    names,
    units: null,
    cells,
    decimalComma: false,
    near: options.near,
    notes,
    crs,
  });
  return {
    format: "geojson",
    shape: found.shape,
    encoding: "utf-8",
    ...(crs === undefined ? {} : { crs }),
    ...(found.crsCandidates ? { crsCandidates: found.crsCandidates } : {}),
    ...(found.example ? { example: found.example } : {}),
    columns: found.columns,
    recordsSampled: features.length,
    notes: notes.list("feature"),
  };
}

const MADE_NOTES = { points: "several-points", line: "line-midpoints", area: "area-centres" } as const;

function noteGeometry({ hasGeometry, madeFrom, number }: PointFeature, notes: NoteBook): void {
  if (!hasGeometry) notes.add("null-geometry", number);
  else if (madeFrom) notes.add(MADE_NOTES[madeFrom], number);
}

function coordinateText(value: number): string {
  return Number.isNaN(value) ? "" : String(value);
}

async function readGeojson(source: ByteSource, mapping: LogMapping, options: ReadOptions): Promise<ReadLog> {
  const layout = await learnLayout(openText(source, { signal: options.signal }));
  const plan = buildReadPlan(mapping, layout.names);
  const opened = openText(source, options);
  const perRecord = Math.max(100, opened.sizeBytes / 60_000);
  const collector = new RecordCollector(plan, {
    expectedLines: Math.ceil(opened.sizeBytes / perRecord) + 16,
    place: "feature",
  });
  const hasLists = layout.paths.some((path) => path.place !== null);
  const flat = hasLists ? null : new FlatFeatureReader(collector, layout.paths);
  const takeFeature = prepareTaking(collector, layout);
  for await (const block of readFeatureBytes(opened)) {
    for (const feature of block) {
      // A feature of the common kind fills the line by itself; any other goes through JSON.parse.
      if (!flat?.read(feature.bytes, feature.number)) takeFeature(parsePoint(feature));
      collector.commit(feature.number);
    }
  }
  return collector.finish();
}

/** Fills the collector's line from a parsed feature. */
function prepareTaking(
  collector: RecordCollector,
  { paths, areaOf }: Pick<FeatureLayout, "paths" | "areaOf">,
): (feature: PointFeature) => void {
  const { kinds } = collector.plan;
  const areaField = paths.length + 2;
  const wantsArea = areaOf !== null && kinds[areaField] !== CELL.skip;
  const used = paths.flatMap((path, index) => (kinds[index + 2] === CELL.skip ? [] : [{ path, field: index + 2 }]));
  return (feature) => {
    const { x, y, number, properties } = feature;
    collector.line[0] = x;
    collector.line[1] = y;
    if (wantsArea) collector.line[areaField] = areaOf(feature);
    noteGeometry(feature, collector.notes);
    for (const { path, field } of used) collector.takeText(field, readProperty(properties, path), number);
  };
}
