import type { PlacedLog } from "@/lib/logs/placed-log";

/** A placed log without its plane's functions: what crosses between threads and into storage. */
export type PackedPlacedLog = Omit<PlacedLog, "plane"> & {
  planeCentre: { longitude: number; latitude: number };
};
