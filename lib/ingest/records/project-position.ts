import proj4 from "proj4";

/** Plane coordinates in metres (or the system's unit) to WGS 84 degrees. */
export type ToDegrees = (eastM: number, northM: number) => [longitude: number, latitude: number];

const WGS84 = "+proj=longlat +datum=WGS84 +no_defs";
const WEB_MERCATOR =
  "+proj=merc +a=6378137 +b=6378137 +lat_ts=0 +lon_0=0 +x_0=0 +y_0=0 +k=1 +units=m +nadgrids=@null +no_defs";

/** Families of UTM zones by EPSG code: code = base + zone. ETRS89, NAD83 and both GDAs lie within a metre or two of WGS 84 and are read so. */
const UTM_FAMILIES: readonly {
  base: number;
  zones: [first: number, last: number];
  south: boolean;
  ellipsoid: string;
}[] = [
  { base: 32600, zones: [1, 60], south: false, ellipsoid: "+datum=WGS84" },
  { base: 32700, zones: [1, 60], south: true, ellipsoid: "+datum=WGS84" },
  { base: 26900, zones: [1, 23], south: false, ellipsoid: "+ellps=GRS80 +towgs84=0,0,0" },
  { base: 25800, zones: [28, 38], south: false, ellipsoid: "+ellps=GRS80 +towgs84=0,0,0" },
  { base: 28300, zones: [46, 59], south: true, ellipsoid: "+ellps=GRS80 +towgs84=0,0,0" },
  { base: 7800, zones: [46, 59], south: true, ellipsoid: "+ellps=GRS80 +towgs84=0,0,0" },
];

/** proj4 text of the EPSG codes a machine log is likely to be in: degrees, UTM zones, web Mercator. */
function epsgDefinition(code: number): string | null {
  if (code === 4326 || code === 4258 || code === 4269) return WGS84;
  if (code === 3857) return WEB_MERCATOR;
  for (const { base, zones, south, ellipsoid } of UTM_FAMILIES) {
    const zone = code - base;
    if (zone < zones[0] || zone > zones[1]) continue;
    return `+proj=utm +zone=${zone}${south ? " +south" : ""} ${ellipsoid} +units=m +no_defs`;
  }
  return null;
}

/**
 * A way from a plane to degrees. `crs`: `EPSG:32614`, `32614`, `urn:ogc:def:crs:EPSG::32614`, a proj4 string, or WKT.
 * Null when the system is unknown. A position outside the plane gives NaN.
 */
export function createToDegrees(crs: string): ToDegrees | null {
  const text = crs.trim();
  const code = /^(?:(?:urn:ogc:def:crs:)?EPSG:(?:[\d.]*:)?)?(\d{4,6})$/i.exec(text)?.[1];
  const definition =
    code !== undefined
      ? epsgDefinition(Number(code))
      : /^\+proj=|^(?:PROJCS|PROJCRS|GEOGCS|GEOGCRS)\s*\[/i.test(text)
        ? text
        : null;
  if (definition === null) return null;
  try {
    const projection = proj4(definition, WGS84);
    const toDegrees: ToDegrees = (east, north) => {
      if (!Number.isFinite(east) || !Number.isFinite(north)) return [NaN, NaN];
      const [longitude, latitude] = projection.forward([east, north]);
      return [longitude ?? NaN, latitude ?? NaN];
    };
    const [longitude, latitude] = toDegrees(1, 1);
    // A definition proj4 half understands shows itself by giving no number anywhere.
    return Number.isNaN(longitude) && Number.isNaN(latitude) ? null : toDegrees;
  } catch {
    return null;
  }
}

/** proj4 has no shift from the system's datum to WGS 84 (its constant for "none"). */
const NO_SHIFT = 5;
const WGS84_RADIUS_M = 6_378_137;

/**
 * Whether a system stands on an old datum whose shift to WGS 84 is not known here: positions are then some hundred metres off.
 * Datums on the ellipsoids of WGS 84 and GRS 80 lie within a metre or two of it.
 */
export function lacksDatumShift(crs: string): boolean {
  try {
    const { a, datum } = new proj4.Proj(crs) as { a?: number; datum?: { datum_type?: number } };
    return datum?.datum_type === NO_SHIFT && Math.abs((a ?? WGS84_RADIUS_M) - WGS84_RADIUS_M) > 1;
  } catch {
    return false;
  }
}
