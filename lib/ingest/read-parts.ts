import { inspectLog, readLog } from "@/lib/ingest";
import { countedSource, type ByteSource } from "@/lib/ingest/byte-source";
import { ingestError, type IngestError } from "@/lib/ingest/ingest-error";
import type { Inspection, InspectOptions, ReadLog, ReadOptions } from "@/lib/ingest/log-format";
import { headerSignature, type LogMapping } from "@/lib/ingest/mapping";
import { joinLogs } from "@/lib/ingest/records/join-logs";
import type { LogNote } from "@/lib/logs/machine-log";
import { fail, succeed, type Result } from "@/lib/result";

/** Most parts one log may come in. */
const MOST_PARTS = 500;

/** Parts of one log, each once: the same bytes twice are taken once. */
async function distinctParts(sources: readonly ByteSource[]): Promise<{ parts: ByteSource[]; repeated: ByteSource[] }> {
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

/**
 * What the parts of one log hold: the columns of the first, once every part is known to have the same. Never throws for bad
 * input. Errors of a part name it; parts with other columns end in `mapping-mismatch`.
 */
export async function inspectParts(
  sources: readonly ByteSource[],
  options: InspectOptions = {},
): Promise<Result<Inspection, IngestError>> {
  const counted = checkCount(sources);
  if (counted) return fail(counted);
  const { parts, repeated } = await distinctParts(sources);
  let whole: Inspection | null = null;
  for (const part of parts) {
    const outcome = await inspectLog(part, options);
    if (!outcome.ok) return fail(inPart(outcome.error, part));
    whole ??= outcome.value;
    if (headerSignature(whole) !== headerSignature(outcome.value)) return fail(otherColumns(part, parts[0]));
  }
  if (!whole) return fail(ingestError("empty-file", "No file was given. Choose the files of one log."));
  return succeed({ ...whole, notes: [...whole.notes, ...noteParts(parts, repeated)] });
}

/**
 * Reads the parts of one log, each by the same mapping, into one: parts in the order of their first time, or as given where
 * a part has none. Never throws for bad input. Source lines count on from part to part.
 */
export async function readParts(
  sources: readonly ByteSource[],
  mapping: LogMapping,
  options: ReadOptions = {},
): Promise<Result<ReadLog, IngestError>> {
  const counted = checkCount(sources);
  if (counted) return fail(counted);
  const { parts, repeated } = await distinctParts(sources);
  const total = parts.reduce((sum, part) => sum + part.sizeBytes, 0);
  const read: ReadLog[] = [];
  let taken = 0;
  for (const part of parts) {
    const followed = countedSource(part, (bytes) => options.onProgress?.(Math.min(1, (taken + bytes) / total)));
    const outcome = await readLog(followed, mapping, { signal: options.signal });
    if (!outcome.ok) return fail(inPart(outcome.error, part));
    taken += part.sizeBytes;
    read.push(outcome.value);
  }
  if (read.length === 0) return fail(ingestError("empty-file", "No file was given. Choose the files of one log."));
  const joined = joinLogs(read.map(({ log }) => log));
  if (!joined.ok) return joined;
  const notes = read.flatMap((part, index) => nameNotes(part.notes, parts[index], parts.length));
  const device = read.find((part) => part.device)?.device;
  return succeed({
    log: joined.value.log,
    notes: [...noteParts(parts, repeated), ...joined.value.notes, ...notes],
    ...(device ? { device } : {}),
  });
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

function otherColumns(part: ByteSource, first: ByteSource | undefined): IngestError {
  return ingestError(
    "mapping-mismatch",
    `"${part.name}" has other columns than "${first?.name ?? ""}", so they are not parts of one log. Upload them one by one.`,
  );
}

function noteParts(parts: readonly ByteSource[], repeated: readonly ByteSource[]): LogNote[] {
  const notes: LogNote[] = [];
  if (parts.length > 1) {
    notes.push({ code: "parts-joined", count: parts.length, message: `The log was read from ${parts.length} files.` });
  }
  if (repeated.length > 0) {
    const message = `${repeated.length === 1 ? "One file was" : `${repeated.length} files were`} given twice ("${repeated[0]?.name ?? ""}") and read once.`;
    notes.push({ code: "parts-repeated", count: repeated.length, message });
  }
  return notes;
}

/** Lines named in a note are those of its own file. */
function nameNotes(notes: readonly LogNote[], part: ByteSource | undefined, count: number): LogNote[] {
  if (count < 2 || !part) return [...notes];
  return notes.map((note) => ({ ...note, message: `${part.name}: ${note.message}` }));
}
