import type { MultiPolygon, Polygon } from "geojson";
import { polygonsOf, windRightHanded } from "@/lib/export/geometry/wind-rings";

const WKB = { point: 1, polygon: 3, multiPolygon: 6 } as const;
const LITTLE_ENDIAN = 1;

/** A point in well-known binary (OGC 06-103r4), little-endian. */
export function pointWkb(longitude: number, latitude: number): Uint8Array {
  const view = new DataView(new ArrayBuffer(21));
  view.setUint8(0, LITTLE_ENDIAN);
  view.setUint32(1, WKB.point, true);
  view.setFloat64(5, longitude, true);
  view.setFloat64(13, latitude, true);
  return new Uint8Array(view.buffer);
}

/** Any polygon as a multipolygon in well-known binary, so that a column holds one type. */
export function multiPolygonWkb(shape: Polygon | MultiPolygon): Uint8Array {
  const polygons = polygonsOf(windRightHanded(shape));
  const bytes = polygons.reduce((sum, rings) => sum + polygonBytes(rings), 9);
  const view = new DataView(new ArrayBuffer(bytes));
  view.setUint8(0, LITTLE_ENDIAN);
  view.setUint32(1, WKB.multiPolygon, true);
  view.setUint32(5, polygons.length, true);
  let at = 9;
  for (const rings of polygons) at = writePolygon(view, at, rings);
  return new Uint8Array(view.buffer);
}

function polygonBytes(rings: Polygon["coordinates"]): number {
  return rings.reduce((sum, ring) => sum + 4 + 16 * ring.length, 9);
}

function writePolygon(view: DataView, start: number, rings: Polygon["coordinates"]): number {
  let at = start;
  view.setUint8(at, LITTLE_ENDIAN);
  view.setUint32(at + 1, WKB.polygon, true);
  view.setUint32(at + 5, rings.length, true);
  at += 9;
  for (const ring of rings) {
    view.setUint32(at, ring.length, true);
    at += 4;
    for (const [longitude, latitude] of ring) {
      view.setFloat64(at, longitude!, true);
      view.setFloat64(at + 8, latitude!, true);
      at += 16;
    }
  }
  return at;
}
