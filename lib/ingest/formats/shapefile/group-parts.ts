import type { ZipEntry } from "@/lib/ingest/formats/shapefile/list-entries";
import type { ZipArchive } from "@/lib/ingest/formats/shapefile/open-zip";
import { stopReading } from "@/lib/ingest/ingest-error";

export interface ShapefileParts {
  shp: ZipEntry;
  dbf: ZipEntry;
  prj: ZipEntry | null;
  cpg: ZipEntry | null;
}

/** The files of the one layer in an archive: each .shp claims the files of its own name. */
export function groupParts({ entries, name }: ZipArchive): ShapefileParts {
  const files = entries.filter((entry) => !/(?:^|\/)(?:__MACOSX|\._)|\/$/.test(entry.name));
  const shapes = files.filter((entry) => /\.shp$/i.test(entry.name));
  const [shp, second] = shapes;
  if (!shp) return stopWithoutShape(files, name);
  if (second) {
    stopReading(
      "several-layers",
      `The zip "${name}" holds ${shapes.length} layers, such as "${shp.name}" and "${second.name}". Upload one log at a time, each in its own zip.`,
    );
  }
  const stem = shp.name.slice(0, -4).toLowerCase();
  const part = (extension: string) =>
    files.find((entry) => entry.name.toLowerCase() === `${stem}.${extension}`) ?? null;
  const dbf = part("dbf");
  if (!dbf) {
    stopReading(
      "missing-part",
      `The zip "${name}" holds "${shp.name}" without its .dbf, which carries the readings. Zip the .shp, .dbf, .shx and .prj together.`,
    );
  }
  return { shp, dbf, prj: part("prj"), cpg: part("cpg") };
}

function stopWithoutShape(files: readonly ZipEntry[], name: string): never {
  if (files.some((entry) => /(?:^|\/)taskdata\.xml$/i.test(entry.name))) {
    stopReading(
      "unknown-file-kind",
      `The zip "${name}" holds ISO 11783-10 task data, which this version does not read yet. Export the log as CSV or as a point shapefile.`,
    );
  }
  const found = files.slice(0, 4).map((entry) => entry.name.slice(0, 60));
  stopReading(
    "unknown-file-kind",
    `The zip "${name}" holds no shapefile (found ${found.join(", ") || "nothing"}). Zip the .shp, .dbf, .shx and .prj of a point log, or upload CSV or GeoJSON.`,
  );
}
