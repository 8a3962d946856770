import "server-only";
import { createHash } from "node:crypto";
import { Readable } from "node:stream";
import { pipeline } from "node:stream/promises";
import busboy from "busboy";
import { nanoid } from "nanoid";
import { AppError } from "@/lib/errors";
import { DETECT_BYTES, detectFormat } from "@/lib/ingest";
import { bytesSource, joinChunks, readHead } from "@/lib/ingest/byte-source";
import { isGzip, openText } from "@/lib/ingest/open-text";
import type { Container } from "@/lib/server/create-container";
import { incomingKey } from "@/lib/server/logs/log-file";

/** A file that has arrived whole, under a key of its own, with the other parts of the form. */
export interface ReceivedUpload {
  key: string;
  fileName: string;
  fileBytes: number;
  sha256: string;
  fields: Record<string, string>;
}

const FIELD_BYTES = 4 * 1024 * 1024;

function tooLarge(maxBytes: number): AppError {
  const mebibytes = Math.floor(maxBytes / 1024 / 1024);
  const size = mebibytes > 0 ? `${mebibytes} MiB` : `${maxBytes} bytes`;
  return new AppError("too_large", `The file is larger than the ${size} that one upload may have. Split the log.`, {
    extra: { maxBytes },
  });
}

/** The file's own name: no folders, no control characters, at most 200 letters. */
function cleanName(name: string | undefined): string {
  const last = (name ?? "").split(/[/\\]/).at(-1) ?? "";
  return (
    last
      .replace(/[\u0000-\u001f\u007f]/g, "")
      .trim()
      .slice(0, 200) || "log"
  );
}

/** @throws AppError `unprocessable` for an empty file, `unsupported_file` for one that no reader takes */
async function refuseUnknownKind(name: string, head: Uint8Array): Promise<void> {
  if (head.length === 0) {
    throw new AppError("unprocessable", `"${name}" is empty. Export the log again and upload that file.`, {
      detailCode: "empty-file",
      places: [{ path: "file", message: "the file is empty" }],
    });
  }
  // The head of a packed file ends in the middle: what it holds so far is enough, and its end is no fault.
  const unpacked = isGzip(head) ? await readHead(openText(bytesSource(name, head), {}), 512).catch(() => null) : head;
  if (unpacked === null || detectFormat(name, unpacked)) return;
  throw new AppError(
    "unsupported_file",
    `"${name}" is no kind of log this program reads. Upload CSV or GeoJSON (also packed as .gz), a zipped shapefile or zipped ISO 11783-10 task data.`,
  );
}

/** Passes the bytes on, hashing and counting, once the first of them look like a log. */
async function* checkBytes(
  file: AsyncIterable<Uint8Array>,
  input: { name: string; maxBytes: number; onBytes(chunk: Uint8Array): void },
): AsyncIterable<Uint8Array> {
  let head: Uint8Array[] | null = [];
  let bytes = 0;
  for await (const chunk of file) {
    bytes += chunk.length;
    if (bytes > input.maxBytes) throw tooLarge(input.maxBytes);
    input.onBytes(chunk);
    if (!head) {
      yield chunk;
      continue;
    }
    head.push(chunk);
    if (bytes < DETECT_BYTES) continue;
    await refuseUnknownKind(input.name, joinChunks(head, bytes));
    yield* head;
    head = null;
  }
  if (!head) return;
  await refuseUnknownKind(input.name, joinChunks(head, bytes));
  yield* head;
}

interface Parts {
  fields: Record<string, string>;
  storing: Promise<{ bytes: number; fileName: string }> | null;
}

/**
 * Streams a multipart form with one `file` to the object store without holding it. Parts may come in any order. When
 * anything goes wrong (too large, no log, connection lost) nothing stays in the store.
 * @throws AppError 413, 415, 422; 400 for a broken form
 */
export async function receiveUpload(
  { env, storage }: Container,
  organisationId: string,
  request: Request,
): Promise<ReceivedUpload> {
  const maxBytes = env.MAX_UPLOAD_BYTES;
  // The form around the file takes some bytes of its own.
  if (Number(request.headers.get("content-length") ?? 0) > maxBytes + FIELD_BYTES) throw tooLarge(maxBytes);
  const key = incomingKey(organisationId, nanoid());
  const hash = createHash("sha256");
  const stopping = new AbortController();
  const parts: Parts = { fields: {}, storing: null };
  const form = openForm(request);
  form.on("field", (name, value) => (parts.fields[name] = value));
  form.on("file", (part, file, info) => {
    if (part !== "file" || parts.storing) return void file.resume();
    const fileName = cleanName(info.filename);
    const checked = checkBytes(file, { name: fileName, maxBytes, onBytes: (chunk) => void hash.update(chunk) });
    parts.storing = storage.put(key, checked, { signal: stopping.signal }).then(({ bytes }) => ({ bytes, fileName }));
    // The form ends at once when the file is refused: nobody wants the rest of it.
    parts.storing.catch((error: unknown) => form.destroy(error instanceof Error ? error : new Error(String(error))));
  });
  try {
    await receiveForm(request, form);
    if (!parts.storing) throw missingFile();
    const { bytes, fileName } = await parts.storing;
    return { key, fileName, fileBytes: bytes, sha256: hash.digest("hex"), fields: parts.fields };
  } catch (error) {
    stopping.abort(error);
    await parts.storing?.catch(() => undefined);
    await storage.delete(key).catch(() => undefined);
    throw error instanceof AppError ? error : brokenForm(error);
  }
}

function openForm(request: Request): busboy.Busboy {
  const type = request.headers.get("content-type") ?? "";
  if (!/^multipart\/form-data\b/i.test(type)) {
    throw new AppError("unsupported_file", "Send the log as multipart/form-data with a part named file.", {
      detailCode: "unsupported_body",
    });
  }
  try {
    return busboy({
      headers: { "content-type": type },
      defParamCharset: "utf8",
      limits: { files: 4, fields: 20, fieldSize: FIELD_BYTES },
    });
  } catch (error) {
    throw brokenForm(error);
  }
}

async function receiveForm(request: Request, form: busboy.Busboy): Promise<void> {
  if (!request.body) throw missingFile();
  await pipeline(Readable.fromWeb(request.body as Parameters<typeof Readable.fromWeb>[0]), form);
}

function missingFile(): AppError {
  const message = "the form needs a part named file";
  return new AppError("unprocessable", `Choose a file: ${message}.`, { places: [{ path: "file", message }] });
}

function brokenForm(cause: unknown): AppError {
  const message = "The upload broke off before its end, or is not a whole form. Nothing was kept; send it again.";
  return new AppError("bad_request", message, { detailCode: "upload_broken", cause });
}
