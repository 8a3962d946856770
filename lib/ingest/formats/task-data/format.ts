import { chooseLayer, describeLayers, type InspectedLayer } from "@/lib/ingest/columns/choose-layer";
import { describeFoundColumns } from "@/lib/ingest/columns/describe-found-columns";
import { holdsTaskData, openTaskData, type TimeLogFiles } from "@/lib/ingest/formats/task-data/open-task-data";
import { hasFix, openTimeLog, TIME_FIELD, type TimeLog } from "@/lib/ingest/formats/task-data/open-time-log";
import { noteTimeLog } from "@/lib/ingest/formats/task-data/note-time-log";
import { readValue } from "@/lib/ingest/formats/task-data/read-value";
import { groupByTask, isGroupId } from "@/lib/ingest/formats/task-data/task-groups";
import { countRecords, scanTimeLog, type TimeRecord } from "@/lib/ingest/formats/task-data/scan-time-log";
import type { ZipArchive } from "@/lib/ingest/formats/zip/open-zip";
import { IngestFailure, stopReading } from "@/lib/ingest/ingest-error";
import {
  READ_LIMITS,
  type ArchivedFormat,
  type InspectOptions,
  type Inspection,
  type ReadLog,
  type ReadOptions,
} from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import { joinLogs } from "@/lib/ingest/records/join-logs";
import { createZoneClock } from "@/lib/ingest/records/local-time";
import { NoteBook } from "@/lib/ingest/records/note-book";
import { buildReadPlan, CELL, type ReadPlan } from "@/lib/ingest/records/read-plan";
import { RecordCollector } from "@/lib/ingest/records/record-collector";

const SAMPLE_RECORDS = 600;

/** ISO 11783-10 task data: the time logs of a controller, in a zip of the TASKDATA folder. */
export const taskDataFormat: ArchivedFormat = {
  id: "iso11783",
  label: "Zipped ISO 11783-10 task data",
  holds: holdsTaskData,
  inspect: inspectTaskData,
  read: readTaskData,
};

async function inspectTaskData(archive: ZipArchive, options: InspectOptions): Promise<Inspection> {
  const { logs, absent } = await openTaskData(archive);
  const notes = new NoteBook();
  notes.set("absent-time-logs", absent.length);
  const inspected: InspectedTimeLog[] = [];
  for (const files of logs) {
    const log = await openTimeLog(archive, files);
    if (log.names.length > READ_LIMITS.columns) stopTooWide(log);
    inspected.push(inspectTimeLog(log, options));
  }
  const withReadings = inspected.filter(({ records }) => records > 0);
  if (withReadings.length === 0) {
    stopReading("no-readings", `The time logs in "${archive.name}" hold no whole record. Export the task data again.`);
  }
  const offered = [...joinTasks(withReadings, logs), ...withReadings];
  const { notes: layerNotes, ...described } = describeLayers(offered.map(({ log: _log, ...layer }) => layer));
  const first = offered.find(({ id }) => id === (described.layers?.[0]?.id ?? id));
  const device = first?.log.device ?? null;
  return {
    format: "iso11783",
    ...described,
    ...(device ? { device } : {}),
    recordsSampled: first?.sampled ?? 0,
    notes: [...layerNotes, ...notes.list("record"), ...(first ? noteTimeLog(first.log, first.notes) : [])],
  };
}

/** All time logs of a task as one more choice, described by the longest of them. */
function joinTasks(inspected: readonly InspectedTimeLog[], files: readonly TimeLogFiles[]): InspectedTimeLog[] {
  const named = inspected.flatMap((layer) => {
    const own = files.find(({ id }) => id === layer.id);
    return own ? [{ ...layer, names: layer.log.names, device: layer.log.device, ...pickTask(own) }] : [];
  });
  return groupByTask(named).flatMap(({ id, label, logs }) => {
    const longest = logs.reduce((best, log) => (log.records > best.records ? log : best));
    const records = logs.reduce((sum, log) => sum + log.records, 0);
    const layer = inspected.find((candidate) => candidate.id === longest.id);
    return layer ? [{ ...layer, id, label, records, isJoined: true }] : [];
  });
}

function pickTask({ task, taskLabel }: TimeLogFiles): Pick<TimeLogFiles, "task" | "taskLabel"> {
  return { task, taskLabel };
}

function stopTooWide({ label, names }: TimeLog): never {
  stopReading(
    "too-many-columns",
    `The time log "${label}" makes ${names.length} columns; a log may have 20,000. Export fewer values.`,
  );
}

type InspectedTimeLog = InspectedLayer & { log: TimeLog; sampled: number; notes: NoteBook };

function inspectTimeLog(log: TimeLog, options: InspectOptions): InspectedTimeLog {
  const records = countRecords(log.bytes, log.header);
  const stride = Math.max(1, Math.ceil(records / SAMPLE_RECORDS));
  const cells: string[][] = log.names.map(() => []);
  scanTimeLog(log.bytes, log.header, (record) => {
    if ((record.number - 1) % stride !== 0) return;
    log.recordColumns.forEach((column, field) => cells[field]?.push(recordText(field, column.read(record))));
    log.valueColumns.forEach((column, index) => {
      cells[log.recordColumns.length + index]?.push(numberText(readValue(column, record.raw[column.place] ?? NaN)));
    });
  });
  const notes = new NoteBook();
  const found = describeFoundColumns({
    names: log.names,
    units: null,
    cells: (field) => cells[field] ?? [],
    decimalComma: false,
    near: options.near,
    notes,
    known: [...log.recordColumns, ...log.valueColumns].map((column) => column.proposal),
  });
  // Of many logs in one file, only one is in memory at a time.
  const described: TimeLog = { ...log, bytes: new Uint8Array(0) };
  const device = log.device ? { device: log.device } : {};
  const sampled = cells[0]?.length ?? 0;
  return { id: log.id, label: log.label, records, ...found, ...device, log: described, sampled, notes };
}

function recordText(field: number, value: number): string {
  if (Number.isNaN(value)) return "";
  return field === TIME_FIELD ? new Date(value).toISOString().replace("T", " ").replace("Z", "") : numberText(value);
}

/** Without the dust of binary fractions: 8402 thousandths are 8.402. */
function numberText(value: number): string {
  return Number.isNaN(value) ? "" : String(Number(value.toPrecision(12)));
}

async function readTaskData(archive: ZipArchive, mapping: LogMapping, options: ReadOptions): Promise<ReadLog> {
  const { logs } = await openTaskData(archive);
  if (isGroupId(mapping.layer)) return readGroup({ archive, logs, mapping, options }, mapping.layer);
  const log = await openTimeLog(archive, chooseLayer(logs, mapping.layer, archive.name));
  return readTimeLog(archive.name, log, mapping, options);
}

interface GroupInput {
  archive: ZipArchive;
  logs: TimeLogFiles[];
  mapping: LogMapping;
  options: ReadOptions;
}

/** All time logs of a task as one, in the order of their times. */
async function readGroup({ archive, logs, mapping, options }: GroupInput, layer: string): Promise<ReadLog> {
  const opened = [];
  for (const files of logs) {
    const log = await openTimeLog(archive, files);
    if (countRecords(log.bytes, log.header) > 0) opened.push({ ...log, ...pickTask(files) });
  }
  const group = chooseLayer(groupByTask(opened), layer, archive.name);
  const read = group.logs.map((log) => readTimeLog(archive.name, log, mapping, options));
  const joined = joinLogs(read.map((part) => part.log));
  if (!joined.ok) throw new IngestFailure(joined.error);
  const message = `The log was read from ${read.length} time logs of one task.`;
  const notes = group.logs.flatMap(({ label }, index) =>
    (read[index]?.notes ?? []).map((note) => ({ ...note, file: label, message: `${label}: ${note.message}` })),
  );
  const { device } = group.logs[0] ?? {};
  return {
    log: joined.value.log,
    notes: [{ code: "parts-joined", count: read.length, message }, ...joined.value.notes, ...notes],
    ...(device ? { device } : {}),
  };
}

// kernel: whose bytes, the opened log, what its columns mean, and how to read
function readTimeLog(archiveName: string, log: TimeLog, mapping: LogMapping, options: ReadOptions): ReadLog {
  const plan = buildReadPlan(mapping, log.names);
  const expectedLines = countRecords(log.bytes, log.header);
  const collector = new RecordCollector(planClock(plan), { expectedLines, place: "record" });
  const take = prepareTaking(log, collector, readClock(mapping, plan));
  const outcome = scanTimeLog(log.bytes, log.header, (record) => {
    if (record.number % 4096 === 0 && options.signal?.aborted) {
      stopReading("cancelled", `Reading "${archiveName}" was cancelled.`);
    }
    take(record);
    collector.commit(record.number);
  });
  if (log.hasForce && !mapping.columns.some(({ channel }) => channel === "margin")) collector.notes.add("no-margin");
  if (outcome.isCut) collector.notes.add("cut-record", outcome.records + 1);
  collector.notes.set("unknown-values", outcome.strangers, outcome.firstStranger);
  const { log: read, notes } = collector.finish();
  return { log: read, notes, ...(log.device ? { device: log.device } : {}) };
}

/** The clock comes as a number, not as text: whatever the unit, it is in milliseconds when the collector sees it. */
function planClock(plan: ReadPlan): ReadPlan {
  if (plan.kinds[TIME_FIELD] === CELL.skip || !plan.time?.fields.includes(TIME_FIELD)) return plan;
  return {
    ...plan,
    time: { fromNumber: (ms) => ms, fromText: null, fields: [TIME_FIELD], isRelative: false, zone: null },
  };
}

/** From the clock of the machine to UTC by the mapping's time zone; as it stands where the mapping says it is UTC. */
function readClock(mapping: LogMapping, plan: ReadPlan): (clockMs: number) => number {
  const isLocal = plan.kinds[TIME_FIELD] === CELL.text;
  const zone =
    isLocal && mapping.timeZone !== undefined ? createZoneClock(mapping.timeZone) : (plan.time?.zone ?? null);
  return zone ? (clockMs) => zone.toUtcMs(clockMs) : (clockMs) => clockMs;
}

/** Fills the collector's line from a record, for the columns in use. */
function prepareTaking(
  log: TimeLog,
  collector: RecordCollector,
  toUtc: (clockMs: number) => number,
): (record: TimeRecord) => void {
  const { line, notes } = collector;
  const { kinds } = collector.plan;
  const first = log.recordColumns.length;
  const records = log.recordColumns.flatMap((column, field) => (kinds[field] === CELL.skip ? [] : [{ column, field }]));
  const values = log.valueColumns.flatMap((column, index) =>
    kinds[first + index] === CELL.skip ? [] : [{ column, field: first + index }],
  );
  return (record) => {
    for (const { column, field } of records) line[field] = column.read(record);
    if (!log.hasUtc) line[TIME_FIELD] = toUtc(record.clockMs);
    for (const { column, field } of values) line[field] = readValue(column, record.raw[column.place]!);
    if (!hasFix(record)) {
      notes.add("no-fix", record.number);
      line[1] = line[2] = NaN;
    }
  };
}
