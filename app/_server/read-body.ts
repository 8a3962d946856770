import "server-only";
import { AppError } from "@/lib/errors";
import { requestChunks } from "@/lib/server/request-chunks";

/** JSON bodies and boundary files; logs are streamed and have their own limit. */
export const MAX_BODY_BYTES = 5 * 1024 * 1024;

function tooLarge(maxBytes: number): AppError {
  return new AppError("too_large", `The request body is larger than ${maxBytes} bytes.`, { extra: { maxBytes } });
}

/** The whole body, read no further than the limit. @throws AppError `too_large` */
export async function readBody(request: Request, maxBytes = MAX_BODY_BYTES): Promise<Uint8Array<ArrayBuffer>> {
  if (Number(request.headers.get("content-length") ?? 0) > maxBytes) throw tooLarge(maxBytes);
  if (!request.body) return new Uint8Array(0);
  const chunks: Uint8Array[] = [];
  let length = 0;
  for await (const chunk of requestChunks(request.body)) {
    length += chunk.length;
    if (length > maxBytes) throw tooLarge(maxBytes);
    chunks.push(chunk);
  }
  const whole = new Uint8Array(length);
  let offset = 0;
  for (const chunk of chunks) {
    whole.set(chunk, offset);
    offset += chunk.length;
  }
  return whole;
}
