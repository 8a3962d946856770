import type { MultiPolygon, Polygon } from "geojson";
import { polygonsOf, windLeftHanded } from "@/lib/export/geometry/wind-rings";

export const SHP_HEADER_BYTES = 100;
const SHAPES = { point: 1, polygon: 5 } as const;
const NULL_BYTES = 4;
const POINT_BYTES = 20;

export const WGS84_WKT =
  'GEOGCS["GCS_WGS_1984",DATUM["D_WGS_1984",SPHEROID["WGS_1984",6378137.0,298.257223563]],' +
  'PRIMEM["Greenwich",0.0],UNIT["Degree",0.0174532925199433]]';

export interface ShapeBytes {
  shp: Uint8Array;
  shx: Uint8Array;
}

type Bounds = [west: number, south: number, east: number, north: number];

/**
 * Main file and index of a shapefile (its public description of 1998) piece by piece: big-endian lengths, little-endian
 * shapes. The header is asked for last, since it tells length and bounds of the whole.
 */
export class ShapeEncoder {
  private records = 0;
  private shpBytes = SHP_HEADER_BYTES;
  private readonly bounds: Bounds = [Infinity, Infinity, -Infinity, -Infinity];

  constructor(private readonly kind: keyof typeof SHAPES) {}

  get length(): { shp: number; records: number } {
    return { shp: this.shpBytes, records: this.records };
  }

  /** Points; one without a place becomes a null shape. */
  addPoints(rows: number, longitude: ArrayLike<number>, latitude: ArrayLike<number>): ShapeBytes {
    const isPlaced = (row: number) => Number.isFinite(longitude[row]!) && Number.isFinite(latitude[row]!);
    const lengths = Array.from({ length: rows }, (_, row) => (isPlaced(row) ? POINT_BYTES : NULL_BYTES));
    return this.addShapes(lengths, (view, at, row) => {
      if (!isPlaced(row)) return;
      view.setInt32(at, SHAPES.point, true);
      this.writePoint(view, at + 4, [longitude[row]!, latitude[row]!]);
    });
  }

  addPolygons(shapes: readonly (Polygon | MultiPolygon)[]): ShapeBytes {
    const ringLists = shapes.map((shape) => polygonsOf(windLeftHanded(shape)).flat());
    const points = ringLists.map((rings) => rings.reduce((sum, ring) => sum + ring.length, 0));
    const lengths = ringLists.map((rings, row) => 44 + 4 * rings.length + 16 * points[row]!);
    return this.addShapes(lengths, (view, at, row) => this.writePolygon(view, at, ringLists[row]!));
  }

  /** The headers of main file and index, for all that was added. */
  headers(): ShapeBytes {
    return {
      shp: this.header(this.shpBytes),
      shx: this.header(SHP_HEADER_BYTES + 8 * this.records),
    };
  }

  private addShapes(
    contentBytes: readonly number[],
    write: (view: DataView, at: number, row: number) => void,
  ): ShapeBytes {
    const shp = new DataView(new ArrayBuffer(contentBytes.reduce((sum, bytes) => sum + 8 + bytes, 0)));
    const shx = new DataView(new ArrayBuffer(8 * contentBytes.length));
    let at = 0;
    contentBytes.forEach((bytes, row) => {
      shx.setUint32(8 * row, this.shpBytes / 2);
      shx.setUint32(8 * row + 4, bytes / 2);
      this.records += 1;
      shp.setInt32(at, this.records);
      shp.setUint32(at + 4, bytes / 2);
      write(shp, at + 8, row);
      at += 8 + bytes;
      this.shpBytes += 8 + bytes;
    });
    return { shp: new Uint8Array(shp.buffer), shx: new Uint8Array(shx.buffer) };
  }

  private writePolygon(view: DataView, start: number, rings: Polygon["coordinates"]): void {
    view.setInt32(start, SHAPES.polygon, true);
    const places = rings.flat();
    const own: Bounds = [Infinity, Infinity, -Infinity, -Infinity];
    for (const place of places) widen(own, place);
    own.forEach((bound, side) => view.setFloat64(start + 4 + 8 * side, bound, true));
    view.setInt32(start + 36, rings.length, true);
    view.setInt32(start + 40, places.length, true);
    let first = 0;
    rings.forEach((ring, index) => {
      view.setInt32(start + 44 + 4 * index, first, true);
      first += ring.length;
    });
    const from = start + 44 + 4 * rings.length;
    places.forEach((place, index) => this.writePoint(view, from + 16 * index, place));
  }

  private writePoint(view: DataView, at: number, place: readonly number[]): void {
    view.setFloat64(at, place[0]!, true);
    view.setFloat64(at + 8, place[1]!, true);
    widen(this.bounds, place);
  }

  private header(bytes: number): Uint8Array {
    const view = new DataView(new ArrayBuffer(SHP_HEADER_BYTES));
    view.setInt32(0, 9994);
    view.setUint32(24, bytes / 2);
    view.setInt32(28, 1000, true);
    view.setInt32(32, SHAPES[this.kind], true);
    // A file without a place has no bounds: zeros, as its readers expect.
    this.bounds.forEach((bound, side) => view.setFloat64(36 + 8 * side, Number.isFinite(bound) ? bound : 0, true));
    return new Uint8Array(view.buffer);
  }
}

function widen(bounds: Bounds, [longitude, latitude]: readonly number[]): void {
  bounds[0] = Math.min(bounds[0], longitude!);
  bounds[1] = Math.min(bounds[1], latitude!);
  bounds[2] = Math.max(bounds[2], longitude!);
  bounds[3] = Math.max(bounds[3], latitude!);
}
