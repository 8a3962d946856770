import "server-only";
import type { z } from "zod";

interface ReplyOptions {
  status?: number;
  headers?: Record<string, string>;
}

/**
 * A JSON reply that has passed its own schema: unknown columns are dropped, a wrong shape is our fault (500, logged
 * with the paths that do not fit).
 */
export function reply<Schema extends z.ZodType>(
  schema: Schema,
  body: z.input<Schema>,
  options: ReplyOptions = {},
): Response {
  const parsed = schema.safeParse(body);
  if (!parsed.success) {
    const places = parsed.error.issues.map((issue) => `${issue.path.join(".")}: ${issue.message}`).join("; ");
    throw new Error(`reply does not fit its schema: ${places}`);
  }
  return new Response(JSON.stringify(parsed.data), {
    status: options.status ?? 200,
    headers: { "content-type": "application/json", "cache-control": "private, no-store", ...options.headers },
  });
}

/** 204, for deletions. */
export function replyNothing(): Response {
  return new Response(null, { status: 204, headers: { "cache-control": "private, no-store" } });
}
