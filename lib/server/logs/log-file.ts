import type { ByteSource } from "@/lib/ingest/byte-source";
import type { ObjectStorage } from "@/lib/ports/object-storage";

export interface LogFile {
  organisationId: string;
  sha256: string;
  fileName: string;
  fileBytes: number;
}

/** One line for a log of several files: what it is listed under. */
export function nameFiles(names: readonly string[]): string {
  const [first = "log", ...others] = names;
  return others.length === 0 ? first : `${first} and ${others.length} more`;
}

/** Where an upload is kept: by its own hash, so that the same bytes are kept once an organisation. */
export function uploadKey(file: Pick<LogFile, "organisationId" | "sha256">): string {
  return `organisations/${file.organisationId}/uploads/${file.sha256}`;
}

/** Where bytes go while they arrive and nobody knows their hash. */
export function incomingKey(organisationId: string, name: string): string {
  return `organisations/${organisationId}/incoming/${name}`;
}

/** The stored file as something the readers of `lib/ingest` take. */
export function storedSource(storage: Pick<ObjectStorage, "get">, file: LogFile): ByteSource {
  const key = uploadKey(file);
  return {
    name: file.fileName,
    sizeBytes: file.fileBytes,
    stream: (options) => storage.get(key, undefined, options),
  };
}
