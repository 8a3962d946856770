import { unzipSync, type UnzipFileInfo } from "fflate";
import proj4 from "proj4";
import { parseShp } from "shpjs";
import { BoundaryFileFailure } from "@/lib/fields/boundary-file-error";

const MOST_ENTRIES = 200;
const MOST_UNPACKED_BYTES = 50 * 1024 * 1024;
const SHAPEFILE_MAGIC = 9994;
const HEADER_BYTES = 100;

/** Refuses an archive by its directory, before anything is unpacked; takes `.shp` and `.prj` only. */
function entryGuard(): (entry: UnzipFileInfo) => boolean {
  let entries = 0;
  let unpackedBytes = 0;
  return (entry) => {
    entries += 1;
    if (entries > MOST_ENTRIES) {
      throw new BoundaryFileFailure("file-unsafe", `The archive has more than ${MOST_ENTRIES} entries.`);
    }
    if (!/\.(shp|prj)$/i.test(entry.name) || /(^|\/)(__MACOSX\/|\._)/.test(entry.name)) return false;
    unpackedBytes += entry.originalSize;
    if (unpackedBytes > MOST_UNPACKED_BYTES) {
      throw new BoundaryFileFailure("file-unsafe", `The archive unpacks to more than ${MOST_UNPACKED_BYTES} bytes.`);
    }
    return true;
  };
}

function unpack(bytes: Uint8Array): Record<string, Uint8Array> {
  try {
    return unzipSync(bytes, { filter: entryGuard() });
  } catch (cause) {
    if (cause instanceof BoundaryFileFailure) throw cause;
    throw new BoundaryFileFailure("file-damaged", "The zip archive is cut short or damaged.");
  }
}

/** A `.shp` cut short would otherwise be read as far as it goes, without a word. */
function checkLength(name: string, shp: Uint8Array): void {
  const view = new DataView(shp.buffer, shp.byteOffset, shp.byteLength);
  if (shp.length < HEADER_BYTES || view.getInt32(0) !== SHAPEFILE_MAGIC) {
    throw new BoundaryFileFailure("file-damaged", `${name} is not a shapefile: its first bytes are wrong.`);
  }
  const statedBytes = view.getInt32(24) * 2;
  if (statedBytes !== shp.length) {
    throw new BoundaryFileFailure("file-damaged", `${name} should have ${statedBytes} bytes and has ${shp.length}.`);
  }
}

/** A projection that nobody understands would leave metres to be taken for degrees. */
function checkProjection(name: string, projection: string): void {
  try {
    proj4(projection);
  } catch {
    throw new BoundaryFileFailure("file-damaged", `The .prj beside ${name} names no projection that is known here.`);
  }
}

function parseGeometries(name: string, shp: Uint8Array, prj: Uint8Array | undefined): unknown[] {
  checkLength(name, shp);
  const projection = prj ? new TextDecoder().decode(prj) : undefined;
  if (projection !== undefined) checkProjection(name, projection);
  try {
    // A copy of its own buffer: the parser reads from the buffer's start.
    return parseShp(shp.slice(), projection);
  } catch (cause) {
    const reason = cause instanceof Error ? cause.message : String(cause);
    throw new BoundaryFileFailure("file-damaged", `${name} could not be read: ${reason}`);
  }
}

/** Geometries of every layer in a zipped shapefile, in WGS 84 by its `.prj`. @throws BoundaryFileFailure */
export function readBoundaryShapefile(bytes: Uint8Array): unknown {
  const files = unpack(bytes);
  const shapes = Object.keys(files).filter((name) => /\.shp$/i.test(name));
  if (shapes.length === 0) {
    throw new BoundaryFileFailure("unknown-file-kind", "The archive holds no .shp file.");
  }
  const geometries = shapes.flatMap((name) => {
    const stem = name.slice(0, -4).toLowerCase();
    const prj = Object.keys(files).find((other) => other.toLowerCase() === `${stem}.prj`);
    return parseGeometries(name, files[name] ?? new Uint8Array(0), prj ? files[prj] : undefined);
  });
  return { type: "GeometryCollection", geometries };
}
