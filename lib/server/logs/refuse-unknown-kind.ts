import { AppError } from "@/lib/errors";
import { detectFormat } from "@/lib/ingest";
import { bytesSource, readHead } from "@/lib/ingest/byte-source";
import { isGzip, openText } from "@/lib/ingest/open-text";

/** The file's own name: no folders, no control characters, at most 200 letters. */
export function cleanFileName(name: string | undefined): string {
  const last = (name ?? "").split(/[/\\]/).at(-1) ?? "";
  return (
    last
      .replace(/[\u0000-\u001f\u007f]/g, "")
      .trim()
      .slice(0, 200) || "log"
  );
}

/** @throws AppError `unprocessable` for an empty file, `unsupported_file` for one that no reader takes */
export async function refuseUnknownKind(name: string, head: Uint8Array): Promise<void> {
  if (head.length === 0) {
    throw new AppError("unprocessable", `"${name}" is empty. Export the log again and upload that file.`, {
      detailCode: "empty-file",
      places: [{ path: "file", message: "the file is empty" }],
    });
  }
  // The head of a packed file ends in the middle: what it holds so far is enough, and its end is no fault.
  const unpacked = isGzip(head) ? await readHead(openText(bytesSource(name, head), {}), 512).catch(() => null) : head;
  if (unpacked === null || detectFormat(name, unpacked)) return;
  throw new AppError(
    "unsupported_file",
    `"${name}" is no kind of log this program reads. Upload CSV or GeoJSON (also packed as .gz), a zipped shapefile or zipped ISO 11783-10 task data.`,
  );
}
