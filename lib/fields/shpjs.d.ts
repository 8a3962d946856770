declare module "shpjs" {
  /** Geometries of a `.shp`, reprojected to WGS 84 by the text of its `.prj`. Throws a raw string for a bad one. */
  export function parseShp(shp: Uint8Array, prj?: string): unknown[];
}
