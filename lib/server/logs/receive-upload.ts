import "server-only";
import { createHash } from "node:crypto";
import { finished } from "node:stream/promises";
import busboy from "busboy";
import { nanoid } from "nanoid";
import { AppError } from "@/lib/errors";
import { DETECT_BYTES } from "@/lib/ingest";
import { joinChunks } from "@/lib/ingest/byte-source";
import { MOST_PARTS } from "@/lib/ingest/join-parts";
import type { Container } from "@/lib/server/create-container";
import { incomingKey } from "@/lib/server/logs/log-file";
import { cleanFileName, refuseUnknownKind } from "@/lib/server/logs/refuse-unknown-kind";
import { requestChunks } from "@/lib/server/request-chunks";

/** A file that has arrived whole, under a key of its own. */
export interface ReceivedFile {
  key: string;
  fileName: string;
  fileBytes: number;
  sha256: string;
}

/** What a form brought: its files in the order sent, at least one, and its other parts. */
export interface ReceivedUpload {
  files: ReceivedFile[];
  fields: Record<string, string>;
}

interface ReceiveOptions {
  organisationId: string;
  request: Request;
  /** Several `file` parts are parts of one log; without it there may be one. */
  together: boolean;
}

const FIELD_BYTES = 4 * 1024 * 1024;

function tooLarge(maxBytes: number): AppError {
  const mebibytes = Math.floor(maxBytes / 1024 / 1024);
  const size = mebibytes > 0 ? `${mebibytes} MiB` : `${maxBytes} bytes`;
  return new AppError("too_large", `The file is larger than the ${size} that one upload may have. Split the log.`, {
    extra: { maxBytes },
  });
}

function refuseFiles(message: string): AppError {
  return new AppError("unprocessable", message, { places: [{ path: "file", message }] });
}

function brokenForm(cause: unknown): AppError {
  const message = "The upload broke off before its end, or is not a whole form. Nothing was kept; send it again.";
  return new AppError("bad_request", message, { detailCode: "upload_broken", cause });
}

/** Passes the bytes on once the first of them look like a log; `onBytes` sees each chunk as it comes. */
async function* checkBytes(
  file: AsyncIterable<Uint8Array>,
  input: { name: string; onBytes(chunk: Uint8Array): void },
): AsyncIterable<Uint8Array> {
  let head: Uint8Array[] | null = [];
  let bytes = 0;
  for await (const chunk of file) {
    bytes += chunk.length;
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

/**
 * Streams a multipart form with its `file` parts to the object store without holding them. Parts may come in any order.
 * When anything goes wrong (too large, no log, connection lost) nothing stays in the store.
 * @throws AppError 413, 415, 422; 400 for a broken form
 */
export async function receiveUpload(container: Container, options: ReceiveOptions): Promise<ReceivedUpload> {
  const { env, storage } = container;
  const maxBytes = env.MAX_UPLOAD_BYTES;
  // The form around the files takes some bytes of its own.
  if (Number(options.request.headers.get("content-length") ?? 0) > maxBytes + FIELD_BYTES) throw tooLarge(maxBytes);
  const stopping = new AbortController();
  const form = openForm(options.request);
  const keys: string[] = [];
  const storing: Promise<ReceivedFile>[] = [];
  const fields: Record<string, string> = {};
  let taken = 0;
  let refusal: unknown = null;
  // The form ends at once when a file is refused: nobody wants the rest of it. The first reason is the one to tell:
  // what it brings about (a form without its end, a stopped upload) says nothing to the sender.
  const refuse = (error: unknown) => {
    refusal ??= error;
    form.destroy(error instanceof Error ? error : new Error(String(error)));
  };
  const onBytes = (chunk: Uint8Array) => {
    taken += chunk.length;
    if (taken > maxBytes) throw tooLarge(maxBytes);
  };
  form.on("field", (name, value) => (fields[name] = value));
  form.on("filesLimit", () => refuse(refuseFiles(`One log may come in at most ${MOST_PARTS} files.`)));
  form.on("file", (part, file, info) => {
    // A refused form ends its files with the reason, which is told elsewhere; unheard, it would end the process.
    file.on("error", () => undefined);
    if (part !== "file") return void file.resume();
    if (storing.length > 0 && !options.together) {
      return refuse(
        refuseFiles("One upload is one log. Send several files one by one, or with together=1 as parts of one log."),
      );
    }
    const key = incomingKey(options.organisationId, nanoid());
    keys.push(key);
    const fileName = cleanFileName(info.filename);
    const stored = storeFile({ container, key, file, fileName, onBytes, refuse, signal: stopping.signal });
    storing.push(stored);
    stored.catch(refuse);
  });
  try {
    await receiveForm(options.request, form);
    if (storing.length === 0) throw refuseFiles("Choose a file: the form needs a part named file.");
    return { files: await Promise.all(storing), fields };
  } catch (error) {
    stopping.abort(error);
    await Promise.allSettled(storing);
    await Promise.allSettled(keys.map((key) => storage.delete(key)));
    const reason = refusal ?? error;
    throw reason instanceof AppError ? reason : brokenForm(reason);
  }
}

interface StoreInput {
  container: Container;
  key: string;
  file: AsyncIterable<Uint8Array>;
  fileName: string;
  onBytes(chunk: Uint8Array): void;
  /** Told at once when the file itself is at fault: the store takes its time to give up what it has begun. */
  refuse(error: unknown): void;
  signal: AbortSignal;
}

/** @throws AppError as `checkBytes`, `unavailable` where the store and not the file failed */
async function storeFile({ container, key, file, fileName, ...input }: StoreInput): Promise<ReceivedFile> {
  const hash = createHash("sha256");
  let isFileAtFault = false;
  const onBytes = (chunk: Uint8Array) => {
    input.onBytes(chunk);
    hash.update(chunk);
  };
  async function* watched(): AsyncIterable<Uint8Array> {
    try {
      yield* checkBytes(file, { name: fileName, onBytes });
    } catch (error) {
      isFileAtFault = true;
      input.refuse(error);
      throw error;
    }
  }
  try {
    const { bytes } = await container.storage.put(key, watched(), { signal: input.signal });
    return { key, fileName, fileBytes: bytes, sha256: hash.digest("hex") };
  } catch (cause) {
    if (isFileAtFault || input.signal.aborted) throw cause;
    throw new AppError("unavailable", "The file store does not answer. Nothing was kept; try again.", { cause });
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
      limits: { files: MOST_PARTS, fields: 20, fieldSize: FIELD_BYTES },
    });
  } catch (error) {
    throw brokenForm(error);
  }
}

/** Feeds the form; settles as soon as it has ended or was refused, whatever is still on its way. */
async function receiveForm(request: Request, form: busboy.Busboy): Promise<void> {
  if (!request.body) throw refuseFiles("Choose a file: the form needs a part named file.");
  const ended = finished(form);
  feedForm(request.body, form).catch((error: unknown) => form.destroy(error instanceof Error ? error : undefined));
  await ended;
}

async function feedForm(body: ReadableStream<Uint8Array>, form: busboy.Busboy): Promise<void> {
  for await (const chunk of requestChunks(body)) {
    if (form.destroyed) return;
    if (!form.write(chunk)) await nextDrain(form);
  }
  if (!form.destroyed) form.end();
}

function nextDrain(form: busboy.Busboy): Promise<void> {
  return new Promise((resolve) => {
    const go = () => {
      form.off("drain", go).off("close", go);
      resolve();
    };
    form.on("drain", go).on("close", go);
  });
}
