import "server-only";
import type { IncomingMessage, ServerResponse } from "node:http";
import type { Duplex } from "node:stream";
import { AppError, ERROR_CODES, type ErrorCode } from "@/lib/errors";
import { writeProblem } from "@/lib/server/web/write-problem";

/** RFC 9110 section 4.1 asks for at least 8000 bytes; the longest addresses of ours (many class edges) stay under 2000. */
export const LONGEST_ADDRESS = 8_192;
/** All header lines of a request together, without its first line. */
export const LONGEST_HEADERS = 16_384;
/** Where Node itself gives up, before any of ours is asked: enough to tell a long address from long headers. */
export const MAX_HEADER_BYTES = 32_768;

function hasBadEscape(path: string): boolean {
  try {
    decodeURIComponent(path);
    return false;
  } catch {
    return true;
  }
}

function headerBytes({ rawHeaders }: Pick<IncomingMessage, "rawHeaders">): number {
  return rawHeaders.reduce((sum, text) => sum + text.length + 2, 0);
}

/** Why a request cannot be taken, judged by its first line and headers alone; null when it can. */
export function findAddressFault(request: Pick<IncomingMessage, "url" | "rawHeaders">): AppError | null {
  const address = request.url ?? "/";
  if (address.length > LONGEST_ADDRESS) {
    return new AppError("address_too_long", `The address is longer than ${LONGEST_ADDRESS} bytes.`);
  }
  if (headerBytes(request) > LONGEST_HEADERS) {
    return new AppError("headers_too_large", `The headers are longer than ${LONGEST_HEADERS} bytes.`);
  }
  const path = address.split("?", 1)[0] ?? "";
  return hasBadEscape(path)
    ? new AppError("bad_request", "The address holds a percent sign that begins no valid UTF-8 character.", {
        detailCode: "malformed_address",
      })
    : null;
}

/** Answers with the fault: problem+json under `/api`, a plain page elsewhere. */
export function refuseAddress(request: IncomingMessage, response: ServerResponse, fault: AppError): void {
  const { status, headers, body } = writeProblem(fault, request.url ?? "/");
  response.writeHead(status, headers).end(request.method === "HEAD" ? undefined : body);
}

interface ParserFault extends Error {
  code?: string;
  rawPacket?: Buffer;
}

function codeOf({ code, rawPacket }: ParserFault): ErrorCode {
  if (code === "ERR_HTTP_REQUEST_TIMEOUT") return "request_timeout";
  if (code !== "HPE_HEADER_OVERFLOW") return "bad_request";
  // The parser does not say which part ran over: its first line tells, where this packet holds it.
  const [line = ""] = (rawPacket?.toString("latin1") ?? "").split("\r\n", 1);
  return /^[A-Z]+ /.test(line) && line.length > LONGEST_ADDRESS ? "address_too_long" : "headers_too_large";
}

/** Answers what Node's parser gave up on, where no request exists to answer. */
export function refuseUnreadable(error: ParserFault, socket: Duplex): void {
  if (error.code === "ECONNRESET" || !socket.writable) {
    socket.destroy();
    return;
  }
  const code = codeOf(error);
  const { status, headers, body } = writeProblem(new AppError(code, `${ERROR_CODES[code].title}.`), "/api/");
  const lines = Object.entries({ ...headers, connection: "close" }).map(([name, value]) => `${name}: ${value}`);
  socket.end([`HTTP/1.1 ${status} ${ERROR_CODES[code].title}`, ...lines, "", body].join("\r\n"));
}
