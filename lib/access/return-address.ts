/**
 * Where to go after signing in or out: the wished address where it lies on this site, else the site's start. Takes an
 * absolute address or a path; anything else, another site's or unreadable, is refused in silence.
 */
export function returnAddress(wished: string, baseUrl: string): string {
  try {
    const url = new URL(wished, `${baseUrl}/`);
    return url.origin === new URL(baseUrl).origin ? url.href : baseUrl;
  } catch {
    return baseUrl;
  }
}
