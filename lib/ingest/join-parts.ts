import { countedSource, type ByteSource } from "@/lib/ingest/byte-source";
import { ingestError, type IngestError } from "@/lib/ingest/ingest-error";
import type { Inspection, InspectOptions, ReadLog, ReadOptions } from "@/lib/ingest/log-format";
import { headerSignature, type LogMapping } from "@/lib/ingest/mapping";
import { joinLogs } from "@/lib/ingest/records/join-logs";
import type { LogNote } from "@/lib/logs/machine-log";
import { fail, succeed, type Result } from "@/lib/result";

/** Most files one log may come in. */
export const MOST_PARTS = 500;

/** How one part is looked at and read. */
export interface PartReader {
  inspect(source: ByteSource, options: InspectOptions): Promise<Result<Inspection, IngestError>>;
  read(source: ByteSource, mapping: LogMapping, options: ReadOptions): Promise<Result<ReadLog, IngestError>>;
}

export interface PartsOptions {
  /** No two files hold the same bytes: whoever gave them has looked. */
  areDistinct?: boolean;
}

interface Parts {
  parts: ByteSource[];
  repeated: ByteSource[];
}

/** Parts of one log, each once: the same bytes twice are taken once. */
async function distinctParts(sources: readonly ByteSource[], { areDistinct = false }: PartsOptions): Promise<Parts> {
  if (areDistinct || sources.length < 2) return { parts: [...sources], repeated: [] };
  const seen = new Set<string>();
  const parts: ByteSource[] = [];
  const repeated: ByteSource[] = [];
  for (const source of sources) {
    const print = await fingerprint(source);
    (seen.has(print) ? repeated : parts).push(source);
    seen.add(print);
  }
  return { parts, repeated };
}

/** Length and two running sums of a file's bytes (FNV-1a and its like with another prime), to tell copies from parts. */
async function fingerprint(source: ByteSource): Promise<string> {
  let [first, second, length] = [0x811c9dc5, 0x9e3779b9, 0];
  for await (const chunk of source.stream()) {
    length += chunk.length;
    for (const byte of chunk) {
      first = Math.imul(first ^ byte, 0x01000193);
      second = Math.imul(second ^ byte, 0x85ebca6b) + 1;
    }
  }
  return `${length} ${first >>> 0} ${second >>> 0}`;
}

/** A part in which nothing was logged: a logger begins one when it is switched on. */
function isEmptyPart({ code }: IngestError): boolean {
  return code === "empty-file" || code === "no-readings";
}

/**
 * What the parts of one log hold: the columns of the first with readings, once every part is known to have the same.
 * Errors of a part name it; parts with other columns end in `mapping-mismatch`.
 */
export async function inspectPartsBy(
  reader: PartReader,
  sources: readonly ByteSource[],
  options: InspectOptions & PartsOptions,
): Promise<Result<Inspection, IngestError>> {
  const counted = checkCount(sources);
  if (counted) return fail(counted);
  const { parts, repeated } = await distinctParts(sources, options);
  const empty: ByteSource[] = [];
  let whole: { inspection: Inspection; part: ByteSource } | null = null;
  let emptiness: IngestError | null = null;
  for (const part of parts) {
    const outcome = await reader.inspect(part, options);
    if (!outcome.ok && isEmptyPart(outcome.error)) {
      emptiness ??= inPart(outcome.error, part);
      empty.push(part);
      continue;
    }
    if (!outcome.ok) return fail(inPart(outcome.error, part));
    whole ??= { inspection: outcome.value, part };
    if (headerSignature(whole.inspection) !== headerSignature(outcome.value)) {
      return fail(otherColumns(part, whole.part));
    }
  }
  if (!whole) return fail(emptiness ?? noFiles());
  const notes = noteParts({ parts, repeated }, empty);
  return succeed({ ...whole.inspection, notes: [...whole.inspection.notes, ...notes] });
}

/**
 * Reads the parts of one log, each by the same mapping, into one: parts in the order of their first time, or as given where
 * a part has none. Source lines count on from part to part.
 */
// kernel: who reads, what, by which mapping, and how
export async function readPartsBy(
  reader: PartReader,
  sources: readonly ByteSource[],
  mapping: LogMapping,
  options: ReadOptions & PartsOptions,
): Promise<Result<ReadLog, IngestError>> {
  const counted = checkCount(sources);
  if (counted) return fail(counted);
  const { parts, repeated } = await distinctParts(sources, options);
  const total = parts.reduce((sum, part) => sum + part.sizeBytes, 0);
  const read: { part: ByteSource; value: ReadLog }[] = [];
  const empty: ByteSource[] = [];
  let emptiness: IngestError | null = null;
  let taken = 0;
  for (const part of parts) {
    const before = taken;
    const followed = countedSource(part, (bytes) => options.onProgress?.(Math.min(1, (before + bytes) / total)));
    const outcome = await reader.read(followed, mapping, { signal: options.signal });
    taken += part.sizeBytes;
    if (outcome.ok) read.push({ part, value: outcome.value });
    else if (!isEmptyPart(outcome.error)) return fail(inPart(outcome.error, part));
    else {
      emptiness ??= inPart(outcome.error, part);
      empty.push(part);
    }
  }
  if (read.length === 0) return fail(emptiness ?? noFiles());
  const joined = joinLogs(read.map(({ value }) => value.log));
  if (!joined.ok) return joined;
  const notes = read.flatMap(({ value, part }) => nameNotes(value.notes, part, parts.length));
  const device = read.find(({ value }) => value.device)?.value.device;
  const recordsOf = new Map(read.map(({ part, value }) => [part, value.log.records]));
  return succeed({
    log: joined.value.log,
    notes: [...noteParts({ parts, repeated }, empty), ...joined.value.notes, ...notes],
    fileRecords: sources.map((source) => recordsOf.get(source) ?? 0),
    fileParts: joined.value.parts.map((one) => ({ ...one, file: sources.indexOf(read[one.file]!.part) })),
    ...(device ? { device } : {}),
  });
}

function noFiles(): IngestError {
  return ingestError("empty-file", "No file was given. Choose the files of one log.");
}

function checkCount(sources: readonly ByteSource[]): IngestError | null {
  if (sources.length <= MOST_PARTS) return null;
  return ingestError(
    "file-too-large",
    `${sources.length} files were given for one log; at most ${MOST_PARTS} are read together. Join some of them first.`,
  );
}

function inPart(error: IngestError, { name }: ByteSource): IngestError {
  return error.message.includes(`"${name}"`) ? error : { ...error, message: `In "${name}": ${error.message}` };
}

function otherColumns(part: ByteSource, first: ByteSource): IngestError {
  return ingestError(
    "mapping-mismatch",
    `"${part.name}" has other columns than "${first.name}", so they are not parts of one log. Upload them one by one.`,
  );
}

function noteParts({ parts, repeated }: Parts, empty: readonly ByteSource[]): LogNote[] {
  const notes: LogNote[] = [];
  const used = parts.length - empty.length;
  if (parts.length > 1) {
    const files = used === 1 ? "1 file" : `${used} files`;
    notes.push({ code: "parts-joined", count: used, message: `The log was read from ${files}.` });
  }
  if (empty.length > 0) {
    const names = listNames(empty);
    const message = `${empty.length === 1 ? "One file holds" : `${empty.length} files hold`} no readings (${names}) and ${empty.length === 1 ? "was" : "were"} left out.`;
    notes.push({ code: "parts-empty", count: empty.length, message });
  }
  if (repeated.length > 0) notes.push(noteRepeated(repeated.map(({ name }) => name)));
  return notes;
}

function listNames(sources: readonly { name: string }[]): string {
  const names = sources.slice(0, 3).map(({ name }) => `"${name}"`);
  return `${names.join(", ")}${sources.length > 3 ? ", …" : ""}`;
}

/** Said of files given twice. @param names of the copies, at least one */
export function noteRepeated(names: readonly string[]): LogNote {
  const [first = ""] = names;
  const many = names.length === 1 ? "One file was" : `${names.length} files were`;
  const message = `${many} given twice ("${first}") and read once.`;
  return { code: "parts-repeated", count: names.length, message };
}

/** Lines named in a note are those of its own file. */
function nameNotes(notes: readonly LogNote[], part: ByteSource, count: number): LogNote[] {
  if (count < 2) return [...notes];
  return notes.map((note) => ({ ...note, file: part.name, message: `${part.name}: ${note.message}` }));
}
