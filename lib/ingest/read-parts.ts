import { inspectLog, readLog } from "@/lib/ingest";
import type { ByteSource } from "@/lib/ingest/byte-source";
import type { IngestError } from "@/lib/ingest/ingest-error";
import { inspectPartsBy, readPartsBy, type PartReader, type PartsOptions } from "@/lib/ingest/join-parts";
import type { Inspection, InspectOptions, ReadLog, ReadOptions } from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Result } from "@/lib/result";

const ANY_FORMAT: PartReader = { inspect: inspectLog, read: readLog };

/** What the files of one log hold: see `inspectPartsBy`. Never throws for bad input. */
export async function inspectParts(
  sources: readonly ByteSource[],
  options: InspectOptions & PartsOptions = {},
): Promise<Result<Inspection, IngestError>> {
  return inspectPartsBy(ANY_FORMAT, sources, options);
}

/** Reads the files of one log into one: see `readPartsBy`. Never throws for bad input. */
export async function readParts(
  sources: readonly ByteSource[],
  mapping: LogMapping,
  options: ReadOptions & PartsOptions = {},
): Promise<Result<ReadLog, IngestError>> {
  return readPartsBy(ANY_FORMAT, sources, mapping, options);
}
