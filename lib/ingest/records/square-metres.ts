import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { ToDegrees } from "@/lib/ingest/records/project-position";

export interface FlatArea {
  /** Square units of the coordinates. */
  area: number;
  /** Its middle, in the coordinates. */
  x: number;
  y: number;
}

const WGS84 = { radiusM: 6378137, eccentricitySquared: 0.00669437999014 };

/** Square metres of a square degree at a latitude: product of the radii of curvature and the cosine (Snyder 1987, eqs. 4-18 to 4-20). */
function squareMetresPerSquareDegree(latitude: number): number {
  const { radiusM, eccentricitySquared } = WGS84;
  const bend = 1 - eccentricitySquared * Math.sin(latitude * RADIANS_PER_DEGREE) ** 2;
  const meridianM = (radiusM * (1 - eccentricitySquared)) / bend ** 1.5;
  const parallelM = (radiusM / Math.sqrt(bend)) * Math.cos(latitude * RADIANS_PER_DEGREE);
  return meridianM * parallelM * RADIANS_PER_DEGREE ** 2;
}

/**
 * What an area covers on the ground, m2, from its size in the file's coordinates and the scale at its middle: good to
 * 1e-4 for areas of a few hundred metres. `toDegrees` is null where the coordinates are degrees.
 */
export function squareMetres({ area, x, y }: FlatArea, toDegrees: ToDegrees | null): number {
  if (!toDegrees) return area * squareMetresPerSquareDegree(y);
  const [longitude, latitude] = toDegrees(x, y);
  const [eastLongitude, eastLatitude] = toDegrees(x + 1, y);
  const [northLongitude, northLatitude] = toDegrees(x, y + 1);
  const stretch =
    (eastLongitude - longitude) * (northLatitude - latitude) - (northLongitude - longitude) * (eastLatitude - latitude);
  return area * Math.abs(stretch) * squareMetresPerSquareDegree(latitude);
}
