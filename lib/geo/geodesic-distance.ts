import geodesic from "geographiclib-geodesic";

export type LonLat = readonly [longitude: number, latitude: number];

export interface GeodesicLine {
  distanceM: number;
  /** Azimuth at the first point, clockwise from north, 0 to below 360. */
  azimuthDeg: number;
}

/** Distance and first azimuth along the WGS 84 ellipsoid (Karney 2013, J. Geodesy 87:43-55). NaN in, NaN out. */
export function geodesicLine(from: LonLat, to: LonLat): GeodesicLine {
  const line = geodesic.Geodesic.WGS84.Inverse(from[1], from[0], to[1], to[0]);
  const azimuth = line.azi1 ?? NaN;
  return { distanceM: line.s12 ?? NaN, azimuthDeg: azimuth < 0 ? azimuth + 360 : azimuth };
}

/** Metres between two places along the WGS 84 ellipsoid. */
export function geodesicDistanceM(from: LonLat, to: LonLat): number {
  return geodesicLine(from, to).distanceM;
}

/** The place reached from `from` after `distanceM` on a geodesic that starts at `azimuthDeg`. */
export function geodesicDestination(from: LonLat, azimuthDeg: number, distanceM: number): [number, number] {
  const end = geodesic.Geodesic.WGS84.Direct(from[1], from[0], azimuthDeg, distanceM);
  return [end.lon2 ?? NaN, end.lat2 ?? NaN];
}
