import { hasPosition } from "@/lib/cleaning/flag-records";
import { createLocalPlane, type LocalPlane } from "@/lib/geo/local-plane";
import type { MachineLog } from "@/lib/logs/machine-log";
import { median } from "@/lib/statistics/median";

export interface AntennaPositions {
  plane: LocalPlane;
  eastM: Float64Array;
  northM: Float64Array;
}

/** A plane about the middle of the log (medians, so that stray positions do not move it) and its antenna in it; null without any position. */
export function placeAntenna(log: MachineLog): AntennaPositions | null {
  const known: number[] = [];
  for (let i = 0; i < log.records; i++) if (hasPosition(log.longitude[i]!, log.latitude[i]!)) known.push(i);
  const first = known[0];
  if (first === undefined) return null;
  const near = log.longitude[first]!;
  const longitude = median(known.map((i) => near + wrapLongitude(log.longitude[i]! - near)));
  const plane = createLocalPlane(wrapLongitude(longitude), median(known.map((i) => log.latitude[i]!)));
  const eastM = new Float64Array(log.records).fill(NaN);
  const northM = new Float64Array(log.records).fill(NaN);
  for (const i of known) [eastM[i], northM[i]] = plane.toPlane(log.longitude[i]!, log.latitude[i]!);
  return { plane, eastM, northM };
}

/** A difference of longitudes brought into -180 to below 180, for logs across the antimeridian. */
function wrapLongitude(degrees: number): number {
  return ((((degrees + 180) % 360) + 360) % 360) - 180;
}
