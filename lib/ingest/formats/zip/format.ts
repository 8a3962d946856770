import type { ByteSource } from "@/lib/ingest/byte-source";
import { shapefileFormat } from "@/lib/ingest/formats/shapefile/format";
import { taskDataFormat } from "@/lib/ingest/formats/task-data/format";
import { cardFormat } from "@/lib/ingest/formats/zip/card-format";
import { isZip, openZip, type ZipArchive } from "@/lib/ingest/formats/zip/open-zip";
import { stopReading } from "@/lib/ingest/ingest-error";
import type { ArchivedFormat, LogFormat, ReadOptions } from "@/lib/ingest/log-format";
import { openText } from "@/lib/ingest/open-text";

/** What a zip may hold, in the order looked for. */
const ARCHIVED_FORMATS: readonly ArchivedFormat[] = [shapefileFormat, taskDataFormat, cardFormat];

/** A zipped log: opened once, then read by whatever knows what is in it. */
export const zipFormat: LogFormat = {
  id: "shapefile",
  label: "Zipped shapefile, ISO 11783-10 task data or CSV and GeoJSON files",
  extensions: [".zip"],
  looksLike: (head) => isZip(head),
  async inspect(source, options) {
    const archive = await open(source, options);
    return findFormat(archive).inspect(archive, options);
  },
  async read(source, mapping, options) {
    const archive = await open(source, options);
    return findFormat(archive).read(archive, mapping, options);
  },
};

function open(source: ByteSource, options: ReadOptions): Promise<ZipArchive> {
  return openZip(openText(source, options));
}

function findFormat(archive: ZipArchive): ArchivedFormat {
  const format = ARCHIVED_FORMATS.find((candidate) => candidate.holds(archive));
  if (format) return format;
  const found = archive.entries.slice(0, 4).map((entry) => entry.name.slice(0, 60));
  stopReading(
    "unknown-file-kind",
    `The zip "${archive.name}" holds no log (found ${found.join(", ") || "nothing"}). Zip the .shp, .dbf, .shx and .prj of a shapefile, a whole TASKDATA folder, or CSV or GeoJSON files of one log.`,
  );
}
