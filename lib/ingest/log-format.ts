import type { ByteSource } from "@/lib/ingest/byte-source";
import type { ZipArchive } from "@/lib/ingest/formats/zip/open-zip";
import type { LogMapping, LogShape } from "@/lib/ingest/mapping";
import type { ChannelId } from "@/lib/logs/channel";
import type { FilePart } from "@/lib/logs/file-parts";
import type { LogNote, MachineLog } from "@/lib/logs/machine-log";
import type { UnitId } from "@/lib/units/unit-table";

export const LOG_FORMAT_IDS = ["csv", "geojson", "shapefile", "iso11783"] as const;
export type LogFormatId = (typeof LOG_FORMAT_IDS)[number];

/** What a column seems to mean. `unit` is null where nothing in the file says: a person must choose. */
export interface ColumnProposal {
  channel: ChannelId;
  row?: number;
  unit: UnitId | null;
  format?: string;
  /** Values, in the file's own unit, that seem to stand for "nothing here". */
  missing?: number[];
  /** 0..1. From 0.7 on, the header and the values agree. */
  confidence: number;
  /** One plain sentence: what the proposal rests on. */
  reason: string;
}

export interface FoundColumn {
  name: string;
  /** Place in the file, from 0. */
  index: number;
  /** Up to five raw texts from the file. */
  sample: string[];
  /** Over the sampled records, in the file's own unit; null where no cell is a number. */
  min: number | null;
  max: number | null;
  proposal: ColumnProposal | null;
  /** Said by the header of a column whose meaning is unknown. */
  hint?: ColumnHint;
  /** The proposal as a sentence for a person. */
  words: string;
}

/** Unit and row that a header names though not what the column is. */
export interface ColumnHint {
  unit?: UnitId;
  row?: number;
}

/** One of several logs in a file. Its columns are there so that a person can choose without the file being read again. */
export interface LogLayer {
  id: string;
  label: string;
  records: number;
  shape: LogShape;
  crs?: string;
  crsCandidates?: CrsCandidate[];
  device?: LoggedDevice;
  example?: string[];
  columns: FoundColumn[];
}

/** A system the file's easting and northing may be in, offered where the file does not say. */
export interface CrsCandidate {
  crs: string;
  /** "UTM zone 14 north, which puts the log 0.4 km from the field". */
  words: string;
}

/** Where the rows of the machine stand, by the device description in the file. Row 1 first; metres. */
export interface LoggedDevice {
  name: string;
  rows: number;
  /** Right of the machine's reference point. */
  rowOffsetsM: number[];
  /** Ahead of the mean of the rows. */
  rowForwardM: number[];
  rowWidthsM: (number | null)[];
  /** Behind the machine's reference point; null where the file does not say. */
  rowsBehindReferenceM: number | null;
}

export interface Inspection {
  format: LogFormatId;
  shape: LogShape;
  /** Text files only. */
  delimiter?: string;
  decimalComma?: boolean;
  encoding?: string;
  /** Where the file itself says in which system its easting and northing are. */
  crs?: string;
  /** Offered where the file holds easting and northing and does not say in which system; best first. */
  crsCandidates?: CrsCandidate[];
  /** Where the file holds several logs: all of them. `columns` are those of the first. */
  layers?: LogLayer[];
  device?: LoggedDevice;
  /** Cells of one record as they stand in the file, in the order of the columns: the first that lacks fewest. */
  example?: string[];
  columns: FoundColumn[];
  recordsSampled: number;
  notes: LogNote[];
}

export interface InspectOptions {
  /** Where the field lies, to notice swapped or foreign positions. */
  near?: { longitude: number; latitude: number };
  signal?: AbortSignal;
}

export interface ReadOptions {
  /** Called with 0..1 as bytes are taken. */
  onProgress?: (fraction: number) => void;
  signal?: AbortSignal;
}

export interface ReadLog {
  log: MachineLog;
  notes: LogNote[];
  /** Where the file describes the machine. */
  device?: LoggedDevice;
  /** Of a log in several files: how many records came from each, in the order the files were given. */
  fileRecords?: number[];
  /** Of a log in several files: which stretch of its records came from which, in the order of the records. */
  fileParts?: FilePart[];
}

/** One kind of file. `inspect` and `read` may throw IngestFailure; `lib/ingest/index.ts` turns that into a Result. */
export interface LogFormat {
  id: LogFormatId;
  label: string;
  extensions: readonly string[];
  looksLike(head: Uint8Array, name: string): boolean;
  inspect(source: ByteSource, options: InspectOptions): Promise<Inspection>;
  read(source: ByteSource, mapping: LogMapping, options: ReadOptions): Promise<ReadLog>;
}

/** One kind of archive content. The archive is opened once, before anybody knows what is in it. */
export interface ArchivedFormat {
  id: LogFormatId;
  label: string;
  holds(archive: ZipArchive): boolean;
  inspect(archive: ZipArchive, options: InspectOptions): Promise<Inspection>;
  read(archive: ZipArchive, mapping: LogMapping, options: ReadOptions): Promise<ReadLog>;
}

/** Sizes beyond which reading stops with a clear error instead of exhausting the machine. */
export const READ_LIMITS = {
  columns: 20_000,
  records: 5_000_000,
  /** Readings over all channels: 1.2 GB of Float32. */
  readings: 300_000_000,
  rows: 1024,
  /** Bytes of one line or feature. */
  lineBytes: 16 * 1024 * 1024,
  /** Packed bytes of an archive, which is held in memory. */
  archiveBytes: 512 * 1024 * 1024,
  unpackedBytes: 2 * 1024 * 1024 * 1024,
  /** Logs in one file. */
  layers: 200,
  /** Columns over all logs of one file that an inspection lists. */
  listedColumns: 20_000,
  /** Bytes of a description of tasks and devices, unpacked; read into a tree, it takes some twenty times that. */
  xmlBytes: 16 * 1024 * 1024,
} as const;
