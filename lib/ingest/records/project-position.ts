import proj4 from "proj4";

/** Plane coordinates in metres (or the system's unit) to WGS 84 degrees. */
export type ToDegrees = (eastM: number, northM: number) => [longitude: number, latitude: number];

const WGS84 = "+proj=longlat +datum=WGS84 +no_defs";
const WEB_MERCATOR =
  "+proj=merc +a=6378137 +b=6378137 +lat_ts=0 +lon_0=0 +x_0=0 +y_0=0 +k=1 +units=m +nadgrids=@null +no_defs";

/** proj4 text of the EPSG codes a machine log is likely to be in: WGS 84, its UTM zones, web Mercator. */
function epsgDefinition(code: number): string | null {
  if (code === 4326) return WGS84;
  if (code === 3857) return WEB_MERCATOR;
  const zone = code % 100;
  const hemisphere = Math.floor(code / 100);
  if ((hemisphere !== 326 && hemisphere !== 327) || zone < 1 || zone > 60) return null;
  return `+proj=utm +zone=${zone}${hemisphere === 327 ? " +south" : ""} +datum=WGS84 +units=m +no_defs`;
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
