import "server-only";
import { createReadStream } from "node:fs";
import { stat } from "node:fs/promises";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import type { LogRow } from "@/db/queries/logs";
import { adjustPart, type KnownAdjustments } from "@/lib/adjustments/adjust-part";
import { describeExport, type ExportAbout } from "@/lib/export/about";
import { nameExport } from "@/lib/export/name-export";
import type { ExportBatch, ExportTable, LogPart } from "@/lib/export/export-table";
import { readAgainMapping } from "@/lib/export/read-again-mapping";
import { readmeText } from "@/lib/export/readme-text";
import { WGS84_WKT } from "@/lib/export/shapefile/shape-encoder";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { ExportQuery } from "@/lib/schemas/export";
import type { LogColumns } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { loadKnownAdjustments } from "@/lib/server/adjustments/load-adjusted-log";
import { arrowChunks } from "@/lib/server/export/arrow-chunks";
import { toByteStream } from "@/lib/server/export/byte-stream";
import { makeInFolder } from "@/lib/server/export/export-folder";
import { outlineOfFrame } from "@/lib/server/export/place-run";
import { loadLogFrame, readLogParts } from "@/lib/server/export/read-log-parts";
import { channelsOfExport, chooseTable, type TableSource } from "@/lib/server/export/table-source";
import { csvChunks, geojsonChunks } from "@/lib/server/export/text-chunks";
import { writeGeopackage } from "@/lib/server/export/write-geopackage";
import { writeShapefile } from "@/lib/server/export/write-shapefile";
import { zipChunks, type ZipEntry } from "@/lib/server/export/zip-chunks";
import { describeLogFiles, findFileParts } from "@/lib/server/logs/describe-log-files";
import { getReadLog } from "@/lib/server/logs/find-placed-log";
import { findRecipeOfLog } from "@/lib/server/logs/recipe-of-log";

export interface ExportFile {
  body: ReadableStream<Uint8Array>;
  fileName: string;
  contentType: string;
  /** Length where it is known before the first byte is sent. */
  bytes: number | null;
}

/** What every format is made from. */
interface Job {
  query: ExportQuery;
  table: ExportTable;
  batches: AsyncGenerator<ExportBatch>;
  about: ExportAbout;
  madeOn: Date;
  dataDir: string;
  /** File name without its ending. */
  name: string;
  /** The text may pass 4 GB. */
  isHuge: boolean;
}

/**
 * Readings, zones or swaths of a log as a file. CSV, GeoJSON and Arrow are made as they are sent; shapefile and GeoPackage
 * first as a whole on disk, so that what cannot be made is refused before the first byte. Each export leaves an audit
 * entry. @throws AppError `not_found`, `conflict` (not read yet, or replaced), `unprocessable`, `too_many_requests`
 */
export async function exportLog(
  container: Container,
  scope: Scope,
  { logId, query }: { logId: string; query: ExportQuery },
): Promise<ExportFile> {
  const log = await getReadLog(scope, { logId, cleaned: query.cleaned });
  const frame = await loadLogFrame(scope, log, channelsOfExport(query));
  const adjustments = query.level === "swaths" ? null : await loadKnownAdjustments(container, log);
  const { recipe, files, fileParts } = await withOrganisation(scope, async (tx) => ({
    recipe: await findRecipeOfLog(tx, scope, log),
    files: await describeLogFiles(tx, scope, log),
    fileParts: await findFileParts(tx, scope, log),
  }));
  const outline = {
    ...outlineOfFrame(frame),
    ...(adjustments?.leftOut ? { leftOut: adjustments.leftOut } : {}),
    ...(fileParts ? { fileParts } : {}),
  };
  const source = chooseTable(outline, query);
  const madeOn = container.clock.now();
  const job: Job = {
    query,
    table: source.table,
    batches: batchesOf(source, readLogParts(scope, log, frame), adjustments),
    about: aboutLog({ log, outline, adjustments, source, query, madeOn, recipe, files }),
    madeOn,
    dataDir: container.env.DATA_DIR,
    name: nameExport(log.name, query.level),
    isHuge: frame.body.records * Math.max(1, frame.body.rows) * source.table.columns.length * CELL_BYTES > ZIP_LIMIT,
  };
  const made = await makeFile(job);
  const { format, level, shape, channel } = query;
  const revision = adjustments ? { revision: log.adjustmentRevision } : {};
  const detail = {
    name: log.name,
    version: log.version,
    ...revision,
    format,
    level,
    shape,
    ...(channel ? { channel } : {}),
  };
  try {
    await withOrganisation(scope, (tx) => recordAudit(tx, scope, { action: "log.export", subject: logId, detail }));
  } catch (error) {
    await made.body.cancel();
    throw error;
  }
  return made;
}

/** A generous cell, and what a plain zip entry may hold with room to spare. */
const CELL_BYTES = 26;
const ZIP_LIMIT = 3e9;

async function* batchesOf(
  source: TableSource,
  parts: AsyncGenerator<LogPart>,
  adjustments: KnownAdjustments | null,
): AsyncGenerator<ExportBatch> {
  for await (const part of parts) yield* source.batches(adjustments ? adjustPart(part, adjustments) : part);
}

function aboutLog(input: {
  log: LogRow;
  outline: PlacedLog;
  adjustments: KnownAdjustments | null;
  source: TableSource;
  query: ExportQuery;
  madeOn: Date;
  recipe: LogColumns["recipe"];
  files: Awaited<ReturnType<typeof describeLogFiles>>;
}): ExportAbout {
  const { log, outline, source, query, madeOn, recipe, adjustments, files } = input;
  const { level, shape, channel, breaks, minLengthM } = query;
  const { readings } = source;
  const names = query.format === "shapefile" ? "shortName" : "name";
  return describeExport({
    table: source.table,
    outline,
    shape,
    madeAt: madeOn.toISOString(),
    log: {
      id: log.id,
      name: log.name,
      kind: log.kind,
      version: log.version,
      startedAt: log.startedAt?.toISOString() ?? null,
      endedAt: log.endedAt?.toISOString() ?? null,
    },
    source: {
      fileName: log.fileName,
      bytes: log.fileBytes,
      sha256: log.sha256,
      files: files.map(({ name, bytes, sha256, records }) => ({ name, bytes, sha256, records })),
    },
    recipe: log.mapping && { ...log.mapping, name: recipe?.name ?? null, version: recipe?.version ?? null },
    notes: log.notes,
    adjustments: adjustments && {
      revision: log.adjustmentRevision,
      delaysS: adjustments.delaysS,
      cleaning: adjustments.cleaning,
    },
    choice: level === "zones" ? { channel, breaks, minLengthM: minLengthM ?? null } : null,
    readAgain: readings ? readAgainMapping({ table: readings, shape, channels: outline.log.channels, names }) : null,
  });
}

async function makeFile(job: Job): Promise<ExportFile> {
  const { query, table, batches, about, name } = job;
  const streamed = (ending: string, contentType: string, chunks: AsyncGenerator<Uint8Array>): ExportFile => {
    return { body: toByteStream(chunks), fileName: `${name}${ending}`, contentType, bytes: null };
  };
  if (query.format === "geojson") {
    return streamed(".geojson", "application/geo+json", geojsonChunks(table, batches, about));
  }
  if (query.format === "arrow") {
    return streamed(".arrow", "application/vnd.apache.arrow.file", arrowChunks(table, batches, about));
  }
  if (query.format === "geopackage") return makeGeopackage(job);
  if (query.format === "shapefile") return makeShapefile(job);
  const csv = csvChunks(table, batches);
  if (!query.bundle) return streamed(".csv", "text/csv; charset=utf-8; header=present", csv);
  const entries = [{ name: `${name}.csv`, content: csv, isHuge: job.isHuge }, ...noteEntries(about, "long")];
  return streamed(".zip", "application/zip", zipChunks(entries, job.madeOn));
}

/** Beside a shapefile the metadata end in `.txt`: readers of zipped maps take any `.json` for a layer. */
function noteEntries(about: ExportAbout, names: "long" | "short"): ZipEntry[] {
  const encoder = new TextEncoder();
  const metadataName = names === "short" ? "metadata.txt" : "metadata.json";
  return [
    { name: "README.txt", content: encoder.encode(readmeText(about, { names, metadataName })) },
    { name: metadataName, content: encoder.encode(`${JSON.stringify(about, null, 2)}\n`) },
  ];
}

async function makeGeopackage({ dataDir, table, batches, about, name }: Job): Promise<ExportFile> {
  const { made, remove } = await makeInFolder(dataDir, async (folder) => {
    const file = await writeGeopackage({ folder, table, batches, about });
    return { file, bytes: (await stat(file)).size };
  });
  const body = toByteStream(fileChunks(made.file), remove);
  return { body, fileName: `${name}.gpkg`, contentType: "application/geopackage+sqlite3", bytes: made.bytes };
}

async function makeShapefile({ dataDir, table, batches, about, name, madeOn }: Job): Promise<ExportFile> {
  const { made, remove } = await makeInFolder(dataDir, (folder) => writeShapefile({ folder, table, batches, madeOn }));
  const encoder = new TextEncoder();
  const entries: ZipEntry[] = [
    { name: `${name}.shp`, content: { path: made.shp } },
    { name: `${name}.shx`, content: { path: made.shx } },
    { name: `${name}.dbf`, content: { path: made.dbf } },
    { name: `${name}.prj`, content: encoder.encode(WGS84_WKT) },
    { name: `${name}.cpg`, content: encoder.encode("UTF-8") },
    ...noteEntries(about, "short"),
  ];
  const body = toByteStream(zipChunks(entries, madeOn), remove);
  return { body, fileName: `${name}.zip`, contentType: "application/zip", bytes: null };
}

async function* fileChunks(file: string): AsyncGenerator<Uint8Array> {
  for await (const chunk of createReadStream(file)) yield chunk as Uint8Array;
}
