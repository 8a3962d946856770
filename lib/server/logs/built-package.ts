import type { LogNote } from "@/lib/logs/machine-log";
import type { PackedPlacedLog } from "@/lib/logs/packed-placed-log";
import type { Log } from "@/lib/schemas/logs";

/** Everything one version of a log consists of, worked out in the reading thread. */
export interface BuiltPackage {
  placed: PackedPlacedLog;
  notes: LogNote[];
  summary: Pick<Log, "kind" | "counts" | "channels" | "bbox"> & {
    startedAt: Date | null;
    endedAt: Date | null;
  };
  results: { kind: string; body: unknown }[];
}

/** The memory blocks of a package, to be handed over instead of copied. */
export function buffersOf({ placed }: BuiltPackage): ArrayBuffer[] {
  const { log, geometry } = placed;
  const views = [
    ...[log.timeMs, log.longitude, log.latitude, log.headingDeg, log.speedMps, log.working, log.loggedPass],
    ...[log.sourceLine, placed.originEastM, placed.originNorthM, placed.headingDeg, placed.speedMps],
    ...[placed.flags, placed.passOf, geometry.offsetM, geometry.forwardM, geometry.widthM],
    ...log.channels.map((channel) => channel.values),
  ];
  const buffers = new Set<ArrayBuffer>();
  for (const view of views) if (view && view.buffer instanceof ArrayBuffer) buffers.add(view.buffer);
  return [...buffers];
}
