declare module "shpjs" {
  /** Geometries of a `.shp`, reprojected to WGS 84 by the text of its `.prj`. Throws a raw string for a bad one. */
  export function parseShp(shp: Uint8Array, prj?: string): unknown[];
  /** The one layer of a zip as GeoJSON, or all where there are several (any `.json` in it counts as one). */
  export function parseZip(zip: Uint8Array): Promise<unknown>;
}
