import "server-only";
import { cookies, headers } from "next/headers";
import { cache } from "react";
import { container } from "@/app/_server/container";
import { addressOf } from "@/app/_server/identify-request";
import { readCookie } from "@/app/_server/session-cookie";
import { AppError } from "@/lib/errors";
import type { SharedView } from "@/lib/schemas/shared";
import { hashSecret } from "@/lib/server/access/secrets";
import { countOpening, openShare, type OpenedShare } from "@/lib/server/shares/open-share";
import { readSharedView } from "@/lib/server/shares/read-shared-view";

/** How long a right passcode opens its link without being asked again. */
export const PASS_SECONDS = 12 * 60 * 60;

/** Each link has its own cookie; the token itself is not in the name. */
export function passCookieName(token: string): string {
  return `coulterbook-pass-${hashSecret(token).slice(0, 16)}`;
}

/** The share of a public request, its passcode taken from the cookie that `POST …/passcode` set. */
export function openSharedRequest(request: Request, token: string): Promise<OpenedShare> {
  const pass = readCookie(request.headers.get("cookie"), passCookieName(token));
  return openShare(container(), { token, pass, from: addressOf(request) });
}

/** Set by `proxy.ts` on requests for `/s/…`; whatever a visitor sent under this name is overwritten. */
export const SHARE_TOKEN_HEADER = "x-share-token";

export type SharedPage =
  { state: "open"; view: SharedView } | { state: "passcode" | "unknown" | "expired" | "revoked" | "busy" };

const STATES: Record<string, Exclude<SharedPage["state"], "open">> = {
  passcode_required: "passcode",
  not_found: "unknown",
  share_expired: "expired",
  share_revoked: "revoked",
  too_many_requests: "busy",
};

/** For the page `/s/[token]`: what it shows, or why it shows nothing. Counts an opening, once a request. */
export const openSharedPage = cache(async (token: string): Promise<SharedPage> => {
  const request = new Request("http://localhost/", { headers: new Headers(await headers()) });
  const pass = (await cookies()).get(passCookieName(token))?.value;
  try {
    const opened = await openShare(container(), { token, pass, from: addressOf(request) });
    await countOpening(container(), opened.share);
    return { state: "open", view: await readSharedView(container(), opened) };
  } catch (error) {
    const state = error instanceof AppError ? STATES[error.detailCode] : undefined;
    if (!state) throw error;
    return { state };
  }
});

/** For the pages that Next puts in place of a closed link: which link, as `proxy.ts` noted it. */
export async function sharedTokenOfRequest(): Promise<string> {
  return (await headers()).get(SHARE_TOKEN_HEADER) ?? "";
}
