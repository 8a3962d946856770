import type { Pass, PlacedLog } from "@/lib/logs/placed-log";

/** West, south, east, north in degrees. */
export type Bbox = readonly [number, number, number, number];

/** True where a ring's own box meets the window. */
export function ringMeets(ring: readonly (readonly number[])[], [west, south, east, north]: Bbox): boolean {
  const lons = ring.map((corner) => corner[0]!);
  const lats = ring.map((corner) => corner[1]!);
  const apart =
    Math.max(...lons) < west || Math.min(...lons) > east || Math.max(...lats) < south || Math.min(...lats) > north;
  return !apart;
}

/** False where a pass surely lies outside the window: its centre line's box, widened by `marginM`, does not meet it. */
export function passMayMeet(placed: PlacedLog, pass: Pass, bbox: Bbox, marginM: number): boolean {
  const corners = [0, 2].flatMap((lon) => [1, 3].map((lat) => placed.plane.toPlane(bbox[lon]!, bbox[lat]!)));
  const east = corners.map((corner) => corner[0]);
  const north = corners.map((corner) => corner[1]);
  const box = { minE: Infinity, maxE: -Infinity, minN: Infinity, maxN: -Infinity };
  for (let i = pass.first; i < pass.first + pass.records; i++) {
    const [e, n] = [placed.originEastM[i]!, placed.originNorthM[i]!];
    if (Number.isNaN(e)) continue;
    box.minE = Math.min(box.minE, e);
    box.maxE = Math.max(box.maxE, e);
    box.minN = Math.min(box.minN, n);
    box.maxN = Math.max(box.maxN, n);
  }
  const apartEast = box.maxE + marginM < Math.min(...east) || box.minE - marginM > Math.max(...east);
  const apartNorth = box.maxN + marginM < Math.min(...north) || box.minN - marginM > Math.max(...north);
  return !(apartEast || apartNorth);
}
