import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { createPassTrack, type PassTrack } from "@/lib/map-state/pass-track";

type Channel = Pick<ResolvedChannel, "id" | "unit" | "rows" | "values">;

/** The track of one pass of a placed log, as the readings endpoint gives it. */
export function trackOfLog(placed: PlacedLog, channel: Channel, pass: number): PassTrack {
  const { first, records } = placed.passes[pass - 1]!;
  const within = Array.from({ length: records }, (_, step) => first + step);
  let distance = 0;
  return createPassTrack({
    channel: channel.id,
    unit: channel.unit,
    rows: channel.rows,
    records,
    pass,
    firstRecord: first,
    timesS: within.map((record) => placed.log.timeMs[record]! / 1000),
    distancesM: within.map((record, step) => {
      if (step > 0) {
        distance += Math.hypot(
          placed.originEastM[record]! - placed.originEastM[record - 1]!,
          placed.originNorthM[record]! - placed.originNorthM[record - 1]!,
        );
      }
      return distance;
    }),
    positions: within.map((record) =>
      placed.plane.toDegrees(placed.originEastM[record]!, placed.originNorthM[record]!),
    ),
    values: Array.from({ length: channel.rows }, (_, row) =>
      within.map((record) => {
        const value = channel.values[record * channel.rows + row]!;
        return Number.isNaN(value) ? null : value;
      }),
    ),
    headingsDeg: within.map((record) => placed.headingDeg[record]!),
    speedsMps: within.map((record) => placed.speedMps[record]!),
    flags: within.map((record) => placed.flags[record]!),
    rowOffsetsM: [...placed.geometry.offsetM],
    rowForwardM: [...placed.geometry.forwardM],
    rowWidthsM: [...placed.geometry.widthM],
  });
}
