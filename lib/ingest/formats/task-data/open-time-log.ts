import { orderRows, type RowOrder } from "@/lib/ingest/formats/task-data/order-rows";
import { unpackXml, type TimeLogFiles } from "@/lib/ingest/formats/task-data/open-task-data";
import { planColumns, type ValueColumn } from "@/lib/ingest/formats/task-data/plan-columns";
import {
  readTimeLogHeader,
  type PositionPart,
  type TimeLogHeader,
} from "@/lib/ingest/formats/task-data/read-time-log-header";
import type { TimeRecord } from "@/lib/ingest/formats/task-data/scan-time-log";
import { unpackEntry, type ZipArchive } from "@/lib/ingest/formats/zip/open-zip";
import { stopReading } from "@/lib/ingest/ingest-error";
import type { ColumnProposal, LoggedDevice } from "@/lib/ingest/log-format";

/** A column that every record has from its time and position, before the values. */
export interface RecordColumn {
  name: string;
  proposal: ColumnProposal;
  read(record: TimeRecord): number;
}

/** A time log made ready: its columns in order, `recordColumns` then `valueColumns`. */
export interface TimeLog {
  id: string;
  label: string;
  header: TimeLogHeader;
  bytes: Uint8Array;
  /** The receiver's UTC stands in the records; else only the machine's own clock does. */
  hasUtc: boolean;
  recordColumns: RecordColumn[];
  valueColumns: ValueColumn[];
  names: string[];
  order: RowOrder;
  device: LoggedDevice | null;
  disagreeing: string[];
  hasForce: boolean;
}

/** How the machine's clock is shown, and what a mapping says when it takes it as a local time. */
export const CLOCK_FORMAT = "yyyy-MM-dd HH:mm:ss.SSS";
/** Place of the columns that every time log has. */
export const TIME_FIELD = 0;

const IS_STATUS_OF_FIX: Record<number, boolean | undefined> = { 0: false, 14: false };

/** Position status 0 is no fix, 14 an error (ISO 11783-10, PTN D). */
export function hasFix({ status }: TimeRecord): boolean {
  return IS_STATUS_OF_FIX[status] ?? true;
}

export async function openTimeLog(archive: ZipArchive, files: TimeLogFiles): Promise<TimeLog> {
  const header = readTimeLogHeader(await unpackXml(archive, files.header), files.header.name);
  if (!header.parts.includes("A") || !header.parts.includes("B")) {
    stopReading(
      "missing-position",
      `The time log "${files.header.name}" records no position, so nothing can be placed on the ground. Record it with a receiver connected.`,
    );
  }
  const bytes = await unpackEntry(archive, files.binary);
  const logged = header.values.flatMap(({ elementId }) => files.elements.get(elementId) ?? []);
  const order = orderRows(files.elements.values(), logged);
  const { columns: valueColumns, disagreeing } = planColumns(header, files.elements, order);
  const hasUtc = header.parts.includes("H") && header.parts.includes("I");
  const recordColumns = planRecordColumns(header.parts, hasUtc);
  return {
    id: files.id,
    label: files.label,
    header,
    bytes,
    hasUtc,
    recordColumns,
    valueColumns,
    names: [...recordColumns, ...valueColumns].map((column) => column.name),
    order,
    device: order.device,
    disagreeing,
    hasForce: header.values.some(({ ddi }) => ddi === 427 || ddi === 366),
  };
}

function planRecordColumns(parts: readonly PositionPart[], hasUtc: boolean): RecordColumn[] {
  const ofFile = "task data has it in every record";
  const degrees = { unit: "deg", confidence: 0.95, reason: ofFile } as const;
  const columns: RecordColumn[] = [
    hasUtc
      ? {
          name: "receiver time (UTC)",
          proposal: { channel: "time", unit: "iso8601", confidence: 0.95, reason: "the receiver's own UTC" },
          read: (record) => record.utcMs,
        }
      : {
          name: "machine clock (local time)",
          proposal: {
            channel: "time",
            unit: "local",
            format: CLOCK_FORMAT,
            confidence: 0.75,
            reason: "task data is stamped by the machine's own clock, which shows local time",
          },
          read: (record) => record.clockMs,
        },
    { name: "longitude", proposal: { channel: "longitude", ...degrees }, read: (record) => record.longitude },
    { name: "latitude", proposal: { channel: "latitude", ...degrees }, read: (record) => record.latitude },
  ];
  const extras: [PositionPart, string, ColumnProposal["unit"], RecordColumn["read"]][] = [
    ["C", "altitude", "m", (record) => record.upM],
    ["D", "position status", "1", (record) => record.status],
    ["E", "PDOP", "1", (record) => record.pdop],
    ["F", "HDOP", "1", (record) => record.hdop],
    ["G", "satellites", "1", (record) => record.satellites],
  ];
  for (const [part, name, unit, read] of extras) {
    if (!parts.includes(part)) continue;
    columns.push({ name, proposal: { channel: `other:${name}`, unit, confidence: 0.9, reason: ofFile }, read });
  }
  return columns;
}
