import { createReadStream, closeSync, openAsBlob, openSync, statSync, writeSync } from "node:fs";
import { join } from "node:path";
import { inspectLog } from "@/lib/ingest";
import type { ByteSource } from "@/lib/ingest/byte-source";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { MachineLog } from "@/lib/logs/machine-log";
import { BENCHMARK_STYLE, createBenchmarkLog, type BenchmarkSize } from "@/lib/simulator/benchmark-log";
import { writeLongCsvChunks, writeWideCsvChunks } from "@/lib/simulator/writers/write-csv";
import { writeGeoJsonChunks } from "@/lib/simulator/writers/write-geojson";
import { writeShapefileZip } from "@/lib/simulator/writers/write-shapefile";

export type BenchFileKind = "wide" | "long" | "geojson" | "shapefile";

export interface BenchFile {
  name: string;
  path: string;
  bytes: number;
  columns: number;
  mapping: LogMapping;
}

const EXTENSIONS: Record<BenchFileKind, string> = {
  wide: "wide.csv",
  long: "long.csv",
  geojson: "geojson",
  shapefile: "zip",
};

function writeChunks(kind: BenchFileKind, log: MachineLog): Iterable<string | Uint8Array> {
  if (kind === "wide") return writeWideCsvChunks(log, BENCHMARK_STYLE);
  if (kind === "long") return writeLongCsvChunks(log, BENCHMARK_STYLE);
  // Property names are repeated in every feature: short ones, as such files have them.
  if (kind === "geojson") return writeGeoJsonChunks(log, { ...BENCHMARK_STYLE, naming: "short" });
  return [writeShapefileZip(log, "bench", BENCHMARK_STYLE)];
}

/** A file on this machine as the readers take it. */
export function diskSource({ name, path, bytes }: Pick<BenchFile, "name" | "path" | "bytes">): ByteSource {
  return { name, sizeBytes: bytes, stream: () => createReadStream(path, { highWaterMark: 1 << 18 }) };
}

/** The file as a part of a form, read from disk while it is sent. */
export function diskBlob({ path }: Pick<BenchFile, "path">): Promise<Blob> {
  return openAsBlob(path);
}

/** A benchmark log as a file, with the mapping a person would confirm. */
export async function makeBenchFile(size: BenchmarkSize, kind: BenchFileKind, folder: string): Promise<BenchFile> {
  const name = `${size}.${EXTENSIONS[kind]}`;
  const path = join(folder, name);
  const file = openSync(path, "w");
  for (const chunk of writeChunks(kind, createBenchmarkLog(size))) writeSync(file, Buffer.from(chunk));
  closeSync(file);
  const { size: bytes } = statSync(path);
  const inspected = await inspectLog(diskSource({ name, path, bytes }));
  if (!inspected.ok) throw new Error(inspected.error.message);
  const { shape, columns: found } = inspected.value;
  const columns = found.flatMap(({ name: column, proposal }) =>
    proposal?.unit ? [{ name: column, channel: proposal.channel, row: proposal.row, unit: proposal.unit }] : [],
  );
  return { name, path, bytes, columns: found.length, mapping: { shape, columns } };
}
