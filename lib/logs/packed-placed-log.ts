import { createLocalPlane } from "@/lib/geo/local-plane";
import type { PlacedLog } from "@/lib/logs/placed-log";

/** A placed log without its plane's functions: what crosses between threads and into storage. */
export type PackedPlacedLog = Omit<PlacedLog, "plane"> & {
  planeCentre: { longitude: number; latitude: number };
};

/** Without the plane's functions, which cannot cross between threads. */
export function packPlacedLog({ plane, ...placed }: PlacedLog): PackedPlacedLog {
  return { ...placed, planeCentre: { longitude: plane.longitude, latitude: plane.latitude } };
}

/** With them again. */
export function unpackPlacedLog({ planeCentre, ...placed }: PackedPlacedLog): PlacedLog {
  return { ...placed, plane: createLocalPlane(planeCentre.longitude, planeCentre.latitude) };
}
