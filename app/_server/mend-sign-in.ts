import "server-only";
import { container } from "@/app/_server/container";
import { readBody } from "@/app/_server/read-body";
import { isSecure, readCookie } from "@/app/_server/session-cookie";
import { AppError } from "@/lib/errors";

/** The forms of next-auth are a few lines long. */
const MAX_BODY_BYTES = 16_384;

/** What next-auth itself takes for an address: absolute http(s), or a path. */
function isAddress(text: string): boolean {
  if (text.startsWith("/")) return URL.canParse(text, "http://localhost");
  return URL.canParse(text) && /^https?:$/.test(new URL(text).protocol);
}

/** next-auth's cookie that remembers where to go after signing in. */
export function returnCookieName(baseUrl: string): string {
  return `${isSecure(baseUrl) ? "__Secure-" : ""}next-auth.callback-url`;
}

/** Whether the request carries a return cookie that cannot be read; next-auth would answer 500 to it for ever. */
export function hasUnreadableReturnCookie(request: Request): boolean {
  const value = readCookie(request.headers.get("cookie"), returnCookieName(container().env.baseUrl));
  return value !== undefined && value !== "" && !isAddress(value);
}

/** A Set-Cookie line that takes the return cookie away. */
export function forgetReturnCookie(): string {
  const { baseUrl } = container().env;
  return `${returnCookieName(baseUrl)}=; Path=/; HttpOnly; SameSite=Lax; Max-Age=0${isSecure(baseUrl) ? "; Secure" : ""}`;
}

function mendAddress(address: string): string {
  const url = new URL(address);
  const wished = url.searchParams.getAll("callbackUrl");
  if (!wished.every((text) => isAddress(text))) url.searchParams.delete("callbackUrl");
  return url.href;
}

function parseForm(text: string, contentType: string): Record<string, string> {
  if (!contentType.includes("application/json")) return Object.fromEntries(new URLSearchParams(text));
  const refusal = new AppError("bad_request", "The body is not a JSON object.", { detailCode: "malformed_json" });
  let parsed: unknown;
  try {
    parsed = JSON.parse(text === "" ? "{}" : text);
  } catch {
    throw refusal;
  }
  if (typeof parsed !== "object" || parsed === null || Array.isArray(parsed)) throw refusal;
  const plain = Object.entries(parsed).filter(([, value]) => ["string", "number", "boolean"].includes(typeof value));
  return Object.fromEntries(plain.map(([key, value]) => [key, String(value)]));
}

/**
 * The request as next-auth can take it: return addresses that cannot be read are left out, the body is a flat form.
 * @throws AppError 400 for a body that is no JSON object, 413 for one too large, 405 for reading an address that only takes forms
 */
export async function mendSignInRequest(request: Request): Promise<Request> {
  const { method } = request;
  const address = mendAddress(request.url);
  const headers = new Headers(request.headers);
  if (method !== "POST") {
    if (/\/callback\/credentials\/?$/.test(new URL(address).pathname)) {
      throw new AppError("method_not_allowed", `${method} is not taken here; POST is.`);
    }
    return new Request(address, { method, headers });
  }
  const text = new TextDecoder().decode(await readBody(request, MAX_BODY_BYTES));
  const form = new URLSearchParams(parseForm(text, headers.get("content-type") ?? ""));
  headers.set("content-type", "application/x-www-form-urlencoded");
  headers.delete("content-length");
  return new Request(address, { method, headers, body: form.toString() });
}
