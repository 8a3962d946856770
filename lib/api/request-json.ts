import type { z } from "zod";
import { ApiProblem } from "@/lib/api/api-problem";
import { Problem } from "@/lib/schemas/problem";

export interface JsonRequest {
  method?: "GET" | "POST" | "PATCH" | "PUT" | "DELETE";
  /** Sent as JSON, unless it is a form. */
  body?: unknown;
  /** Repeating a POST with the same key makes one thing, not two. */
  idempotencyKey?: string;
  signal?: AbortSignal;
}

// Which of a person's organisations the open page belongs to; a session alone does not say.
let organisationSlug: string | null = null;

/** Names the organisation of every request from here on, and by a cookie also of those the browser makes itself. */
export function actIn(slug: string): void {
  organisationSlug = slug;
  document.cookie = `coulterbook-organisation=${encodeURIComponent(slug)}; path=/; samesite=lax`;
}

/** The problem in a refusing reply; replies without a readable body (a proxy's page) get words of their own. */
export function readProblem(status: number, text: string): ApiProblem {
  const parsed = Problem.safeParse(parseOrNull(text));
  if (parsed.success) return new ApiProblem(parsed.data);
  return new ApiProblem({
    type: "about:blank",
    title: "The server refused",
    status,
    detail: `The server answered with status ${status} and no explanation.`,
    code: "unknown",
  });
}

function parseOrNull(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

function buildInit(request: JsonRequest): RequestInit {
  const headers: Record<string, string> = { accept: "application/json" };
  if (organisationSlug) headers["x-organisation"] = organisationSlug;
  if (request.idempotencyKey) headers["idempotency-key"] = request.idempotencyKey;
  const isForm = request.body instanceof FormData;
  if (request.body !== undefined && !isForm) headers["content-type"] = "application/json";
  return {
    method: request.method ?? "GET",
    headers,
    body:
      request.body instanceof FormData
        ? request.body
        : request.body === undefined
          ? undefined
          : JSON.stringify(request.body),
    signal: request.signal,
    credentials: "same-origin",
    // A deletion asked for as the page is left still arrives.
    keepalive: request.method === "DELETE",
  };
}

/**
 * Asks the API and checks the reply against its schema.
 * @throws ApiProblem when the server refuses; TypeError when it does not answer.
 */
export async function requestJson<Schema extends z.ZodType>(
  schema: Schema,
  path: string,
  request: JsonRequest = {},
): Promise<z.infer<Schema>> {
  const response = await fetch(path, buildInit(request));
  const text = await response.text();
  if (!response.ok) throw readProblem(response.status, text);
  return schema.parse(text === "" ? null : JSON.parse(text));
}

/** For replies without a body worth reading (204 and deletions). */
export async function requestNothing(path: string, request: JsonRequest): Promise<void> {
  const response = await fetch(path, buildInit(request));
  if (!response.ok) throw readProblem(response.status, await response.text());
}
