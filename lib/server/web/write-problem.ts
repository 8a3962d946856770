import "server-only";
import { ERROR_CODES, type AppError } from "@/lib/errors";

export interface WrittenProblem {
  status: number;
  headers: Record<string, string>;
  body: string;
}

const SAFE_HEADERS = {
  "cache-control": "no-store",
  "x-content-type-options": "nosniff",
  "referrer-policy": "no-referrer",
};

function writePage(title: string, detail: string): string {
  return `<!doctype html>
<html lang="en">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1"><title>${title}</title></head>
<body style="font: 16px/1.5 system-ui, sans-serif; max-width: 36rem; margin: 4rem auto; padding: 0 1.25rem; background: #fbfaf6; color: #1e2430">
<h1 style="font-size: 1.5rem">${title}</h1>
<p>${detail}</p>
<p><a href="/" style="color: #2f5d80">To the start</a></p>
</body>
</html>
`;
}

/**
 * A fault as bytes, for requests that are refused before the framework sees them: RFC 9457 under `/api`, a plain page
 * elsewhere. The texts are ours and hold nothing of the request.
 */
export function writeProblem(fault: AppError, address: string): WrittenProblem {
  const { status, title } = ERROR_CODES[fault.code];
  const isApi = address.startsWith("/api/");
  const problem = {
    type: `urn:coulterbook:problem:${fault.detailCode}`,
    title,
    status,
    detail: fault.userMessage,
    code: fault.detailCode,
  };
  const body = isApi ? JSON.stringify(problem) : writePage(title, fault.userMessage);
  const type = isApi ? "application/problem+json" : "text/html; charset=utf-8";
  const headers = { ...SAFE_HEADERS, "content-type": type, "content-length": String(Buffer.byteLength(body)) };
  const policy = "default-src 'none'; style-src 'unsafe-inline'; frame-ancestors 'none'; base-uri 'none'";
  return { status, headers: isApi ? headers : { ...headers, "content-security-policy": policy }, body };
}
