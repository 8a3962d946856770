import { zipSync, type Zippable } from "fflate";

export interface DbfColumn {
  name: string;
  type: "N" | "C" | "L" | "D" | "F";
  length: number;
  cells: string[];
}

export const WGS84_PRJ =
  'GEOGCS["GCS_WGS_1984",DATUM["D_WGS_1984",SPHEROID["WGS_1984",6378137.0,298.257223563]],PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]]';

/** UTM zone 14N as Esri writes it. */
export const UTM14_PRJ =
  'PROJCS["WGS_1984_UTM_Zone_14N",GEOGCS["GCS_WGS_1984",DATUM["D_WGS_1984",SPHEROID["WGS_1984",6378137.0,298.257223563]],PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]],PROJECTION["Transverse_Mercator"],PARAMETER["False_Easting",500000.0],PARAMETER["False_Northing",0.0],PARAMETER["Central_Meridian",-99.0],PARAMETER["Scale_Factor",0.9996],PARAMETER["Latitude_Of_Origin",0.0],UNIT["Meter",1.0]]';

/**
 * A .shp by the Esri technical description of July 1998: file code 9994 big-endian at 0, length in 16-bit words big-endian at
 * 24, version 1000 and shape type little-endian at 28 and 32; each record has a big-endian header. Null makes a null shape.
 */
export function makeShp(points: ([x: number, y: number] | null)[], type = 1): Uint8Array {
  const contentBytes = type === 11 ? 36 : 20;
  const sizes = points.map((point) => 8 + (point ? contentBytes : 4));
  const bytes = new Uint8Array(100 + sizes.reduce((sum, size) => sum + size, 0));
  const view = new DataView(bytes.buffer);
  view.setInt32(0, 9994);
  view.setInt32(24, bytes.length / 2);
  view.setInt32(28, 1000, true);
  view.setInt32(32, type, true);
  let at = 100;
  points.forEach((point, index) => {
    view.setInt32(at, index + 1);
    view.setInt32(at + 4, ((sizes[index] ?? 0) - 8) / 2);
    view.setInt32(at + 8, point ? type : 0, true);
    if (point) {
      view.setFloat64(at + 12, point[0], true);
      view.setFloat64(at + 20, point[1], true);
    }
    at += sizes[index] ?? 0;
  });
  return bytes;
}

/** A dBase III table: header of 32 bytes, 32 a field, a 13, then records of fixed width that begin with a deletion mark. */
export function makeDbf(columns: DbfColumn[], options: { deleted?: number[] } = {}): Uint8Array {
  const records = columns[0]?.cells.length ?? 0;
  const recordBytes = 1 + columns.reduce((sum, column) => sum + column.length, 0);
  const firstByte = 32 + columns.length * 32 + 1;
  const bytes = new Uint8Array(firstByte + records * recordBytes + 1);
  const view = new DataView(bytes.buffer);
  const write = (text: string, at: number) => [...text].forEach((letter, i) => (bytes[at + i] = letter.charCodeAt(0)));
  bytes[0] = 3;
  view.setUint32(4, records, true);
  view.setUint16(8, firstByte, true);
  view.setUint16(10, recordBytes, true);
  columns.forEach((column, i) => {
    write(column.name, 32 + i * 32);
    write(column.type, 32 + i * 32 + 11);
    bytes[32 + i * 32 + 16] = column.length;
  });
  bytes[firstByte - 1] = 13;
  for (let record = 0; record < records; record++) {
    let at = firstByte + record * recordBytes;
    bytes[at++] = options.deleted?.includes(record) ? 42 : 32;
    for (const column of columns) {
      const cell = column.cells[record] ?? "";
      write(column.type === "N" ? cell.padStart(column.length) : cell.padEnd(column.length), at);
      at += column.length;
    }
  }
  bytes[bytes.length - 1] = 26;
  return bytes;
}

export function zipOf(files: Record<string, Uint8Array | string>): Uint8Array {
  const entries: Zippable = {};
  for (const [name, content] of Object.entries(files)) {
    entries[name] = typeof content === "string" ? new TextEncoder().encode(content) : content;
  }
  return zipSync(entries);
}

/** A .shp of lines (3), areas (5) or multipoints (8) by the same description: type, box, counts, starts of the parts, points. */
export function makeManyPointShp(shapes: [x: number, y: number][][][], type: 3 | 5 | 8): Uint8Array {
  const contents = shapes.map((parts) => {
    const points = parts.flat();
    const partBytes = type === 8 ? 0 : 4 + 4 * parts.length;
    const view = new DataView(new ArrayBuffer(40 + partBytes + 16 * points.length));
    view.setInt32(0, type, true);
    if (type !== 8) view.setInt32(36, parts.length, true);
    view.setInt32(type === 8 ? 36 : 40, points.length, true);
    let start = 0;
    if (type !== 8) {
      parts.forEach((part, i) => {
        view.setInt32(44 + 4 * i, start, true);
        start += part.length;
      });
    }
    points.forEach(([x, y], i) => {
      view.setFloat64(40 + partBytes + 16 * i, x, true);
      view.setFloat64(48 + partBytes + 16 * i, y, true);
    });
    return new Uint8Array(view.buffer);
  });
  const bytes = new Uint8Array(100 + contents.reduce((sum, content) => sum + 8 + content.length, 0));
  const view = new DataView(bytes.buffer);
  view.setInt32(0, 9994);
  view.setInt32(24, bytes.length / 2);
  view.setInt32(28, 1000, true);
  view.setInt32(32, type, true);
  let at = 100;
  contents.forEach((content, i) => {
    view.setInt32(at, i + 1);
    view.setInt32(at + 4, content.length / 2);
    bytes.set(content, at + 8);
    at += 8 + content.length;
  });
  return bytes;
}
