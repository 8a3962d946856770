import type { ExportQuery } from "@/lib/schemas/export";
import type { ExportFile } from "@/lib/server/export/export-log";

/** Headers of an exported file. A plain CSV has no room for notes: `Link` names the zip that has them. */
export function exportHeaders(
  { fileName, contentType, bytes }: Omit<ExportFile, "body">,
  query: ExportQuery,
  url: URL,
): Record<string, string> {
  const headers: Record<string, string> = {
    "content-type": contentType,
    "content-disposition": `attachment; filename="${fileName}"`,
    "cache-control": "private, no-store",
  };
  if (bytes !== null) headers["content-length"] = String(bytes);
  if (query.format === "csv" && !query.bundle) {
    const search = new URLSearchParams(url.searchParams);
    search.set("bundle", "zip");
    headers.link = `<${url.pathname}?${search}>; rel="alternate"; type="application/zip"; title="with README and metadata"`;
  }
  return headers;
}
