import "server-only";
import type { z } from "zod";
import { MAX_BODY_BYTES, readBody } from "@/app/_server/read-body";
import { AppError } from "@/lib/errors";
import { refuseUnstorable } from "@/lib/storable-text";

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
