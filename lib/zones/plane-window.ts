import type { PlacedLog } from "@/lib/logs/placed-log";
import { longitudeNear, unwrapPositions } from "@/lib/geo/cut-at-antimeridian";
import type { PassStep } from "@/lib/rows/pass-members";

/** West, south, east, north in degrees; west > east across the antimeridian (RFC 7946 5.2). */
export type Bbox = readonly [number, number, number, number];

/** True where a ring's own box meets the window. */
export function ringMeets(ring: readonly (readonly number[])[], [west, south, east, north]: Bbox): boolean {
  const eastOn = east < west ? east + 360 : east;
  const first = longitudeNear(ring[0]?.[0] ?? NaN, (west + eastOn) / 2);
  const lons = unwrapPositions(ring as number[][], first).map((corner) => corner[0]!);
  const lats = ring.map((corner) => corner[1]!);
  const apartEast = Math.max(...lons) < west || Math.min(...lons) > eastOn;
  const apartNorth = Math.max(...lats) < south || Math.min(...lats) > north;
  return !(apartEast || apartNorth);
}

/** The first and last step whose centre lies within `marginM` of the window; null where none does. */
export function stepsNear(
  placed: PlacedLog,
  steps: readonly PassStep[],
  { bbox, marginM }: { bbox: Bbox; marginM: number },
): { first: number; last: number } | null {
  const corners = [0, 2].flatMap((lon) => [1, 3].map((lat) => placed.plane.toPlane(bbox[lon]!, bbox[lat]!)));
  const east = corners.map((corner) => corner[0]);
  const north = corners.map((corner) => corner[1]);
  const [minE, maxE] = [Math.min(...east) - marginM, Math.max(...east) + marginM];
  const [minN, maxN] = [Math.min(...north) - marginM, Math.max(...north) + marginM];
  let first = -1;
  let last = -1;
  steps.forEach(({ record }, k) => {
    const [e, n] = [placed.originEastM[record]!, placed.originNorthM[record]!];
    if (e < minE || e > maxE || n < minN || n > maxN) return;
    if (first < 0) first = k;
    last = k;
  });
  return first < 0 ? null : { first, last };
}
