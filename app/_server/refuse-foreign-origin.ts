import "server-only";
import { AppError } from "@/lib/errors";

const SAFE_METHODS = new Set(["GET", "HEAD", "OPTIONS"]);

function hostOf(origin: string): string | null {
  try {
    return new URL(origin).host;
  } catch {
    return null;
  }
}

/**
 * Same-origin check of requests that a browser signs with its cookie. Browsers always name their origin on these;
 * scripts name none and are let through, since no page can make them send a cookie.
 * @throws AppError `forbidden`
 */
export function refuseForeignOrigin(request: Request, baseUrl: string): void {
  if (SAFE_METHODS.has(request.method)) return;
  const site = request.headers.get("sec-fetch-site");
  const origin = request.headers.get("origin");
  const ownHosts = new Set([hostOf(baseUrl), request.headers.get("host") ?? new URL(request.url).host]);
  const isForeignSite = site !== null && site !== "same-origin" && site !== "none";
  const isForeignOrigin = origin !== null && !ownHosts.has(hostOf(origin));
  if (isForeignSite || isForeignOrigin) {
    throw new AppError("forbidden", "This request came from another site.", { detailCode: "foreign_origin" });
  }
}
