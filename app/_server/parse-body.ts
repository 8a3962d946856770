import "server-only";
import type { z } from "zod";
import { MAX_BODY_BYTES, readBody } from "@/app/_server/read-body";
import { AppError } from "@/lib/errors";

// PostgreSQL keeps neither NUL nor half a surrogate pair in text and jsonb.
const UNSTORABLE = /\u0000|\p{Surrogate}/u;

/** Deeper than anything this API takes; without an end, a hostile body would exhaust the stack. */
const DEEPEST = 32;

function findUnstorable(value: unknown, path: string, depth = 0): string | null {
  if (typeof value === "string") return UNSTORABLE.test(value) ? path : null;
  if (typeof value !== "object" || value === null) return null;
  if (depth > DEEPEST) throw new AppError("unprocessable", `The body is nested deeper than ${DEEPEST} levels.`);
  for (const [key, inner] of Object.entries(value)) {
    const found = UNSTORABLE.test(key) ? path : findUnstorable(inner, path ? `${path}.${key}` : key, depth + 1);
    if (found !== null) return found;
  }
  return null;
}

function refuseUnstorable(value: unknown): void {
  const path = findUnstorable(value, "");
  if (path === null) return;
  const message = "contains a character that cannot be stored (NUL or half of a surrogate pair)";
  throw new AppError("unprocessable", `${path || "The body"} ${message}.`, { places: [{ path, message }] });
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (cause) {
    const reason = cause instanceof Error ? cause.message : "not JSON";
    throw new AppError("bad_request", `The body is not JSON: ${reason}`, { detailCode: "malformed_json", cause });
  }
}

/** The JSON body through its schema. @throws AppError 400 malformed, 413 too large, 415 not JSON; ZodError for the rest. */
export async function parseBody<Schema extends z.ZodType>(
  schema: Schema,
  request: Request,
  maxBytes = MAX_BODY_BYTES,
): Promise<z.output<Schema>> {
  const type = request.headers.get("content-type") ?? "";
  if (!/^application\/([\w.+-]+\+)?json\b/i.test(type)) {
    throw new AppError("unsupported_file", `Send the body as application/json, not as "${type || "nothing"}".`, {
      detailCode: "unsupported_body",
    });
  }
  const body = parseJson(new TextDecoder().decode(await readBody(request, maxBytes)));
  refuseUnstorable(body);
  return schema.parse(body);
}

/** Query parameters through their schema; of a repeated one the last counts. */
export function parseQuery<Schema extends z.ZodType>(schema: Schema, url: URL): z.output<Schema> {
  const query = Object.fromEntries(url.searchParams);
  refuseUnstorable(query);
  return schema.parse(query);
}
