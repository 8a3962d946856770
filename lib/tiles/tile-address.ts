/**
 * Web-Mercator addresses (EPSG:3857 scheme, XYZ). World units run 0..1 from the antimeridian eastwards and from
 * 85.05 degrees north southwards. Source of the formulas: EPSG Guidance Note 7-2, method 1024; OGC Two Dimensional Tile
 * Matrix Set, "WebMercatorQuad".
 */
const DEGREES = Math.PI / 180;
/** WGS 84. */
const SEMI_MAJOR_M = 6378137;
const ECCENTRICITY_SQUARED = 0.0066943799901413165;

export interface TileAddress {
  z: number;
  x: number;
  y: number;
}

/** Degrees to world units. Longitudes beyond 180 simply run on past 1, so that a track across the antimeridian stays whole. */
export function toWorld(longitude: number, latitude: number): [x: number, y: number] {
  const sine = Math.sin(latitude * DEGREES);
  return [longitude / 360 + 0.5, 0.5 - Math.log((1 + sine) / (1 - sine)) / (4 * Math.PI)];
}

/** World units to degrees, the inverse of `toWorld`. */
export function fromWorld(x: number, y: number): [longitude: number, latitude: number] {
  return [(x - 0.5) * 360, Math.atan(Math.sinh(Math.PI * (1 - 2 * y))) / DEGREES];
}

/** World units that one metre on the WGS 84 ellipsoid covers, eastwards and (as a positive number) northwards. */
export function worldPerMetre(latitude: number): { east: number; north: number } {
  const sine = Math.sin(latitude * DEGREES);
  const cosine = Math.cos(latitude * DEGREES);
  const w = 1 - ECCENTRICITY_SQUARED * sine * sine;
  const primeVerticalM = SEMI_MAJOR_M / Math.sqrt(w);
  const meridianM = (SEMI_MAJOR_M * (1 - ECCENTRICITY_SQUARED)) / (w * Math.sqrt(w));
  return { east: 1 / (2 * Math.PI * primeVerticalM * cosine), north: 1 / (2 * Math.PI * meridianM * cosine) };
}

/** The tile that holds a place; columns wrap round the world, rows stop at its edge. */
export function tileAt(longitude: number, latitude: number, z: number): TileAddress {
  const count = 2 ** z;
  const [worldX, worldY] = toWorld(longitude, latitude);
  const x = Math.floor(worldX * count);
  const y = Math.min(count - 1, Math.max(0, Math.floor(worldY * count)));
  return { z, x: ((x % count) + count) % count, y };
}

/** Whether such a tile exists: whole numbers, zoom 0..24, column and row below 2^z. */
export function isTileAddress({ z, x, y }: TileAddress): boolean {
  if (![z, x, y].every(Number.isInteger) || z < 0 || z > 24) return false;
  return x >= 0 && y >= 0 && x < 2 ** z && y < 2 ** z;
}

/** The pixel of a `size` px tile that holds a place, counted from the tile's north-west corner (may lie outside it). */
export function pixelAt(
  longitude: number,
  latitude: number,
  tile: TileAddress,
  size: number,
): [column: number, row: number] {
  const [worldX, worldY] = toWorld(longitude, latitude);
  const count = 2 ** tile.z;
  return [Math.floor((worldX * count - tile.x) * size), Math.floor((worldY * count - tile.y) * size)];
}
