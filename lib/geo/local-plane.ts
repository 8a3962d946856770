import proj4 from "proj4";

/** A transverse-Mercator plane about one place (WGS 84, scale 1 on its meridian), metres east and north of it. */
export interface LocalPlane {
  longitude: number;
  latitude: number;
  toPlane(longitude: number, latitude: number): [eastM: number, northM: number];
  toDegrees(eastM: number, northM: number): [longitude: number, latitude: number];
}

/** Scale error stays below 1e-8 within 1 km and 1.2e-6 within 10 km of the centre's meridian (x squared over 2 R squared). */
export function createLocalPlane(longitude: number, latitude: number): LocalPlane {
  const projection = proj4(
    "+proj=longlat +datum=WGS84 +no_defs",
    `+proj=tmerc +lat_0=${latitude} +lon_0=${longitude} +k=1 +x_0=0 +y_0=0 +datum=WGS84 +units=m +no_defs`,
  );
  return {
    longitude,
    latitude,
    toPlane: (lon, lat) => projection.forward([lon, lat]) as [number, number],
    toDegrees: (eastM, northM) => projection.inverse([eastM, northM]) as [number, number],
  };
}
