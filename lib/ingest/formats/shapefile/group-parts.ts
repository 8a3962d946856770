import type { ZipEntry } from "@/lib/ingest/formats/zip/list-entries";
import type { ZipArchive } from "@/lib/ingest/formats/zip/open-zip";
import { stopReading } from "@/lib/ingest/ingest-error";

export interface ShapefileParts {
  /** Path in the archive without its ending. */
  id: string;
  /** The last part of the path. */
  label: string;
  shp: ZipEntry;
  dbf: ZipEntry;
  prj: ZipEntry | null;
  cpg: ZipEntry | null;
}

function listFiles({ entries }: ZipArchive): ZipEntry[] {
  return entries.filter((entry) => !/(?:^|\/)(?:__MACOSX|\._)|\/$/.test(entry.name));
}

export function holdsShapefile(archive: ZipArchive): boolean {
  return listFiles(archive).some((entry) => /\.shp$/i.test(entry.name));
}

export interface GroupedParts {
  layers: ShapefileParts[];
  /** Names of .shp files without a .dbf beside them. */
  bare: string[];
}

/** The layers of an archive: each .shp claims the files of its own name. Stops with `missing-part` where none has its table. */
export function groupParts(archive: ZipArchive): GroupedParts {
  const files = listFiles(archive);
  const byName = new Map(files.map((entry) => [entry.name.toLowerCase(), entry]));
  const shapes = files.filter((entry) => /\.shp$/i.test(entry.name));
  const bare: string[] = [];
  const layers = shapes.flatMap((shp): ShapefileParts[] => {
    const id = shp.name.slice(0, -4);
    const part = (extension: string) => byName.get(`${id.toLowerCase()}.${extension}`) ?? null;
    const dbf = part("dbf");
    if (!dbf) {
      bare.push(shp.name);
      return [];
    }
    return [{ id, label: id.split("/").at(-1) ?? id, shp, dbf, prj: part("prj"), cpg: part("cpg") }];
  });
  if (layers.length > 0) return { layers, bare };
  stopReading(
    "missing-part",
    `The zip "${archive.name}" holds "${shapes[0]?.name ?? ""}" without its .dbf, which carries the readings. Zip the .shp, .dbf, .shx and .prj together.`,
  );
}
