import "server-only";
import { container } from "@/app/_server/container";
import { addressOf } from "@/app/_server/identify-request";
import { readBody } from "@/app/_server/read-body";
import { toResponse } from "@/app/_server/to-response";
import { AppError } from "@/lib/errors";
import { countAttempt, forgetAttempts } from "@/lib/server/access/limit-attempts";

function emailIn(body: string, contentType: string): string {
  if (!contentType.includes("json")) return new URLSearchParams(body).get("email") ?? "";
  try {
    const parsed: unknown = JSON.parse(body);
    return typeof parsed === "object" && parsed !== null && "email" in parsed ? String(parsed.email) : "";
  } catch {
    return "";
  }
}

/** The sign-in page's own library looks for `url` in every reply. */
function withAddress(error: unknown, baseUrl: string): unknown {
  if (!(error instanceof AppError)) return error;
  const url = `${baseUrl}/sign-in?error=${error.code}`;
  return new AppError(error.code, error.userMessage, { extra: { ...error.extra, url } });
}

/** Counts sign-in attempts by account and sender before next-auth sees them; a right one clears the count. */
export async function limitSignIn(
  request: Request,
  signIn: (request: Request) => Promise<Response>,
): Promise<Response> {
  try {
    const body = await readBody(request, 16_384);
    const contentType = request.headers.get("content-type") ?? "";
    const email = emailIn(new TextDecoder().decode(body), contentType).trim().toLowerCase();
    const from = `${email}|${addressOf(request)}`;
    await countAttempt("sign-in-from", from);
    await countAttempt("sign-in", email);
    const { method, headers, url } = request;
    const response = await signIn(new Request(url, { method, headers, body }));
    const isSignedIn = response.headers.getSetCookie().some((line) => /session-token=[^;]/.test(line));
    if (isSignedIn) await Promise.all([forgetAttempts("sign-in-from", from), forgetAttempts("sign-in", email)]);
    return response;
  } catch (error) {
    return toResponse(withAddress(error, container().env.baseUrl));
  }
}
