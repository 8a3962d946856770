import { NextResponse, type NextRequest } from "next/server";

/** First parts of addresses that are no organisation's. */
const RESERVED = new Set(["sign-in", "s", "docs", "api", "_next", "icons", "fonts"]);
const ORGANISATION_COOKIE = "coulterbook-organisation";
const REMEMBERED_SECONDS = 365 * 24 * 60 * 60;

function isHttps(): boolean {
  return (process.env.BASE_URL ?? "").startsWith("https:");
}

/** Where an installation's own basemap comes from, if it names one; see BASEMAP_STYLE_URL and BASEMAP_TILES_URL. */
function basemapOrigins(): string {
  const addresses = [process.env.BASEMAP_STYLE_URL, process.env.BASEMAP_TILES_URL];
  const origins = addresses.flatMap((address) => (address && URL.canParse(address) ? [new URL(address).origin] : []));
  return [...new Set(origins)].map((origin) => ` ${origin}`).join("");
}

/**
 * What a page may load: its own origin, and scripts that carry this request's nonce.
 * `style-src` needs `unsafe-inline`: dialogs and menus (radix) lock scrolling with a style element of their own, and
 * rendered charts carry style attributes; neither can be given a nonce. The map's worker is a file of ours; the map
 * library also makes pictures and small workers from blobs.
 */
function contentSecurityPolicy(nonce: string): string {
  const isDevelopment = process.env.NODE_ENV === "development";
  return [
    "default-src 'self'",
    // React's development build uses eval to show call stacks.
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${isDevelopment ? " 'unsafe-eval'" : ""}`,
    "style-src 'self' 'unsafe-inline'",
    `img-src 'self' data: blob:${basemapOrigins()}`,
    "font-src 'self' data:",
    `connect-src 'self'${basemapOrigins()}${isDevelopment ? " ws:" : ""}`,
    "worker-src 'self' blob:",
    "object-src 'none'",
    "base-uri 'self'",
    "form-action 'self'",
    "frame-ancestors 'none'",
    ...(isHttps() ? ["upgrade-insecure-requests"] : []),
  ].join("; ");
}

function setHeaders(response: NextResponse, policy: string, isShare: boolean): void {
  response.headers.set("Content-Security-Policy", policy);
  response.headers.set("X-Content-Type-Options", "nosniff");
  response.headers.set("X-Frame-Options", "DENY");
  response.headers.set("Cross-Origin-Opener-Policy", "same-origin");
  response.headers.set("Permissions-Policy", "geolocation=(self), camera=(), microphone=(), payment=(), usb=()");
  // The address of a share is its key: it must reach no other site and no index.
  response.headers.set("Referrer-Policy", isShare ? "no-referrer" : "same-origin");
  if (isShare) response.headers.set("X-Robots-Tag", "noindex, nofollow, noarchive");
  if (isHttps()) response.headers.set("Strict-Transport-Security", "max-age=31536000");
}

function rememberOrganisation(response: NextResponse, slug: string | undefined): void {
  if (!slug || RESERVED.has(slug) || !/^[a-z0-9][a-z0-9-]{0,62}$/.test(slug)) return;
  response.cookies.set(ORGANISATION_COOKIE, slug, {
    httpOnly: true,
    sameSite: "lax",
    secure: isHttps(),
    path: "/",
    maxAge: REMEMBERED_SECONDS,
  });
}

/** Headers of every page. Routes under /api set their own: running here would hold whole uploads in memory. */
export async function proxy(request: NextRequest): Promise<NextResponse> {
  const nonce = Buffer.from(crypto.randomUUID()).toString("base64");
  const policy = contentSecurityPolicy(nonce);
  const headers = new Headers(request.headers);
  headers.set("x-nonce", nonce);
  headers.set("Content-Security-Policy", policy);
  const [first, ...rest] = request.nextUrl.pathname.split("/").filter(Boolean);
  // Next's not-found and unauthorized pages are told neither address nor parameters.
  headers.set("x-share-token", first === "s" ? (rest[0] ?? "") : "");
  const response = NextResponse.next({ request: { headers } });
  setHeaders(response, policy, first === "s");
  if (rest.length > 0) rememberOrganisation(response, first);
  return response;
}

export const config = {
  matcher: [
    {
      // Not the API, and not files: those of the build, and those in `public/`.
      source: "/((?!api/|_next/static|_next/image|basemap/|demo/|icons/|fonts/|[^/]*\\.[a-z0-9]+$).*)",
      missing: [
        { type: "header", key: "next-router-prefetch" },
        { type: "header", key: "purpose", value: "prefetch" },
      ],
    },
  ],
};
