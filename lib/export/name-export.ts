import type { ExportLevel } from "@/lib/export/export-table";

/** "East quarter, 24 September" as `east-quarter-24-september-readings`: safe as a file's name everywhere. */
export function nameExport(logName: string, level: ExportLevel): string {
  const words = logName
    .normalize("NFKD")
    .toLowerCase()
    .replaceAll(/\.[a-z]{2,8}$/g, "")
    .replaceAll(/[^a-z0-9]+/g, "-")
    .replaceAll(/^-+|-+$/g, "")
    .slice(0, 60);
  return `${words || "log"}-${level}`;
}
