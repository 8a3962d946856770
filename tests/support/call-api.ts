import { readdirSync } from "node:fs";
import path from "node:path";

type Handler = (request: Request, context: { params: Promise<Record<string, string>> }) => Promise<Response>;

export interface ApiCall {
  method?: string;
  path: string;
  headers?: Record<string, string>;
  cookie?: string;
  token?: string;
  /** Sent as JSON, unless it is a form or a string. */
  body?: unknown;
}

const ROOT = path.resolve("app");

/** Folders of every `route.ts` under `app/api`, e.g. `api/v1/fields/[fieldId]`. */
export function listRouteFolders(): string[] {
  return readdirSync(path.join(ROOT, "api"), { recursive: true, encoding: "utf8" })
    .filter((name) => path.basename(name) === "route.ts")
    .map((name) => path.posix.join("api", path.dirname(name)));
}

function matchFolder(folder: string, segments: string[]): Record<string, string> | null {
  const parts = folder.split("/");
  const params: Record<string, string> = {};
  for (const [i, part] of parts.entries()) {
    const name = /^\[(\.\.\.)?(\w+)\]$/.exec(part);
    const given = segments[i];
    if (name?.[1]) return given === undefined ? null : { ...params, [name[2]!]: segments.slice(i).join("/") };
    if (given === undefined) return null;
    if (name) params[name[2]!] = decodeURIComponent(given);
    else if (part !== given) return null;
  }
  return parts.length === segments.length ? params : null;
}

/** How Next chooses: names before parameters, from the left, a catch-all last. */
function rank(folder: string): string {
  return folder
    .split("/")
    .map((part) => (part.startsWith("[...") ? "2" : part.startsWith("[") ? "1" : "0"))
    .join("");
}

function findRoute(pathname: string): { folder: string; params: Record<string, string> } {
  const segments = pathname.split("/").filter(Boolean);
  const fitting = listRouteFolders()
    .map((folder) => ({ folder, params: matchFolder(folder, segments) }))
    .filter((route): route is { folder: string; params: Record<string, string> } => route.params !== null)
    .sort((a, b) => rank(a.folder).localeCompare(rank(b.folder)));
  if (!fitting[0]) throw new Error(`no route.ts for ${pathname}`);
  return fitting[0];
}

function buildRequest(call: ApiCall): Request {
  const headers = new Headers(call.headers);
  if (call.cookie) headers.set("cookie", call.cookie);
  if (call.token) headers.set("authorization", `Bearer ${call.token}`);
  const isPlain = call.body === undefined || call.body instanceof FormData || typeof call.body === "string";
  if (!(call.body instanceof FormData) && call.body !== undefined && !headers.has("content-type")) {
    headers.set("content-type", "application/json");
  }
  const body = isPlain ? (call.body as FormData | string | undefined) : JSON.stringify(call.body);
  return new Request(`http://localhost:3000${call.path}`, { method: call.method ?? "GET", headers, body });
}

/** Calls the handler that Next would choose for this request, without a server. */
export async function callApi(call: ApiCall): Promise<Response> {
  const request = buildRequest(call);
  const { folder, params } = findRoute(new URL(request.url).pathname);
  const route = (await import(path.join(ROOT, folder, "route.ts"))) as Record<string, Handler | undefined>;
  const handler = route[request.method];
  if (!handler) throw new Error(`${folder}/route.ts exports no ${request.method}`);
  return handler(request, { params: Promise.resolve(params) });
}
