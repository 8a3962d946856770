import "server-only";
import { givenClasses } from "@/lib/channels/given-classes";
import type { ResolvedChannel } from "@/lib/channels/resolve-channel";
import { reasonsAt } from "@/lib/cleaning/reasons-at";
import { flagCodes } from "@/lib/cleaning/flags";
import { AppError } from "@/lib/errors";
import type { LimitZoneKind, LimitZonesBody } from "@/lib/schemas/limit-zones";
import type { ReadingAt } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import { loadLeftOut } from "@/lib/server/adjustments/load-adjusted-log";
import type { Container } from "@/lib/server/create-container";
import { findPlacedLog, loadChannel, type LogChoice } from "@/lib/server/logs/find-placed-log";
import { loadTileIndex } from "@/lib/server/tiles/load-tile-index";
import { locateReading } from "@/lib/tiles/locate-reading";
import { buildLimitZones } from "@/lib/zones/limit-zones";
import { buildSwaths, type SwathCollection } from "@/lib/zones/swaths";
import { buildZones, type ZoneCollection } from "@/lib/zones/zones";

const orNull = (value: number | undefined) => (value !== undefined && Number.isFinite(value) ? value : null);

/** What every channel read at one record and row. */
function valuesAt(channels: readonly ResolvedChannel[], record: number, row: number): Record<string, number | null> {
  const entries = channels.map((channel) => {
    const place = channel.perRow ? record * channel.rows + row - 1 : record * channel.rows;
    return [channel.id, orNull(channel.values[place])] as const;
  });
  return Object.fromEntries(entries);
}

/** The reading under a place. @throws AppError `not_found` where no row went */
export async function readAt(
  container: Container,
  scope: Scope,
  input: LogChoice & { lon: number; lat: number },
): Promise<ReadingAt> {
  const { log, placed } = await findPlacedLog(container, scope, { ...input, channel: null });
  const found = locateReading(await loadTileIndex(log), input.lon, input.lat);
  if (!found) throw new AppError("not_found", "No row of this log went over that place.", { detailCode: "no_reading" });
  const { record, row } = found;
  const ids = [...log.channels.map(({ id }) => id), ...givenClasses(log.channels, placed.machine ?? {})];
  const channels = await Promise.all(ids.map((id) => loadChannel(container, log, id)));
  const timeMs = placed.log.timeMs[record]!;
  return {
    pass: placed.passOf[record]!,
    record,
    row,
    time: placed.log.timeIsRelative || !Number.isFinite(timeMs) ? null : new Date(timeMs).toISOString(),
    headingDeg: orNull(placed.headingDeg[record]),
    speedMps: orNull(placed.speedMps[record]),
    values: valuesAt(channels, record, row),
    flags: flagCodes(placed.flags[record]!),
    leftOut: reasonsAt(await loadLeftOut(container, log), { channels, record, row }),
  };
}

export type Bbox = [number, number, number, number];

export async function readZones(
  container: Container,
  scope: Scope,
  input: LogChoice & { channel: string; breaks: number[]; bbox?: Bbox; minLengthM?: number },
): Promise<ZoneCollection> {
  const { placed } = await findPlacedLog(container, scope, input);
  const { breaks, bbox, minLengthM } = input;
  return buildZones(placed, input.channel, { breaks, bbox, minLengthM });
}

/** Stretches past a limit. @throws AppError `unprocessable` where the log or its machine cannot tell */
export async function readLimitZones(
  container: Container,
  scope: Scope,
  input: LogChoice & { kind: LimitZoneKind; depthM?: number; bbox?: Bbox; minLengthM?: number },
): Promise<LimitZonesBody> {
  const { kind, depthM, bbox, minLengthM, ...choice } = input;
  const channel = kind === "at-limit" ? "downforce" : kind === "too-shallow" ? "depth" : "margin";
  const { placed } = await findPlacedLog(container, scope, { ...choice, channel });
  return buildLimitZones(placed, { kind, depthM, bbox, minLengthM });
}

export async function readSwaths(
  container: Container,
  scope: Scope,
  input: { logId: string; bbox?: Bbox },
): Promise<SwathCollection> {
  const { placed } = await findPlacedLog(container, scope, { ...input, channel: null });
  return buildSwaths(placed, { bbox: input.bbox });
}
