import { inspectLog, readLog } from "@/lib/ingest";
import { bytesSource, type ByteSource } from "@/lib/ingest/byte-source";
import type { Inspection, ReadLog } from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import { proposeMapping } from "@/lib/ingest/propose-mapping";

export function textSource(text: string, name = "log.csv", chunkBytes?: number): ByteSource {
  return bytesSource(name, new TextEncoder().encode(text), chunkBytes);
}

/** Bytes of a text in UTF-16, with its byte-order mark. */
export function utf16(text: string, isBigEndian = false): Uint8Array {
  const bytes = new Uint8Array(2 + text.length * 2);
  const view = new DataView(bytes.buffer);
  view.setUint16(0, 0xfeff, !isBigEndian);
  for (let i = 0; i < text.length; i++) view.setUint16(2 + i * 2, text.charCodeAt(i), !isBigEndian);
  return bytes;
}

export async function mustInspect(
  source: ByteSource,
  near?: { longitude: number; latitude: number },
): Promise<Inspection> {
  const outcome = await inspectLog(source, { near });
  if (!outcome.ok) throw new Error(`${outcome.error.code}: ${outcome.error.message}`);
  return outcome.value;
}

export async function mustRead(source: ByteSource, mapping: LogMapping): Promise<ReadLog> {
  const outcome = await readLog(source, mapping);
  if (!outcome.ok) throw new Error(`${outcome.error.code}: ${outcome.error.message}`);
  return outcome.value;
}

/** Reads by the proposals of the file itself. */
export async function readAsProposed(source: ByteSource): Promise<ReadLog> {
  return mustRead(source, proposeMapping(await mustInspect(source)).mapping);
}

/** The code of the error a file ends in, by its own proposals or a mapping; null when it could be read. */
export async function errorOf(source: ByteSource, mapping?: LogMapping) {
  if (mapping === undefined) {
    const inspected = await inspectLog(source);
    if (!inspected.ok) return inspected.error;
    const outcome = await readLog(source, proposeMapping(inspected.value).mapping);
    return outcome.ok ? null : outcome.error;
  }
  const outcome = await readLog(source, mapping);
  return outcome.ok ? null : outcome.error;
}

const SIMPLE: LogMapping["columns"] = [
  { name: "t", channel: "time", unit: "s" },
  { name: "lon", channel: "longitude", unit: "deg" },
  { name: "lat", channel: "latitude", unit: "deg" },
  { name: "DF_1", channel: "downforce", row: 1, unit: "lbf" },
  { name: "DF_2", channel: "downforce", row: 2, unit: "lbf" },
];

/** Mapping of files headed `t,lon,lat,DF_1,DF_2`. */
export const SIMPLE_MAPPING: LogMapping = { shape: "wide", columns: SIMPLE };
export const SIMPLE_HEADER = "t,lon,lat,DF_1,DF_2";
