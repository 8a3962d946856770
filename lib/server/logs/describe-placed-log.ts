import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { LogNote } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { Log, PassBody } from "@/lib/schemas/logs";
import type { BuiltAnswers } from "@/lib/server/logs/built-answers";

/** Smallest and largest finite value and how many there are; null extremes for a channel without a reading. */
function measureRange(values: Float32Array): { min: number | null; max: number | null; n: number } {
  let min = Infinity;
  let max = -Infinity;
  let n = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (!(Math.abs(value) < Infinity)) continue;
    n += 1;
    if (value < min) min = value;
    if (value > max) max = value;
  }
  return n > 0 ? { min, max, n } : { min: null, max: null, n };
}

/** Over the records with a position, unwrapped about the log's own centre; west > east across the antimeridian. */
function boundingBox(placed: PlacedLog): Log["bbox"] {
  const box = [Infinity, Infinity, -Infinity, -Infinity] as [number, number, number, number];
  const centre = placed.plane.longitude;
  for (let i = 0; i < placed.log.records; i++) {
    if (!Number.isFinite(placed.originEastM[i]!)) continue;
    const longitude = placed.log.longitude[i]!;
    const latitude = placed.log.latitude[i]!;
    const near = longitude - 360 * Math.round((longitude - centre) / 360);
    box[0] = Math.min(box[0], near);
    box[1] = Math.min(box[1], latitude);
    box[2] = Math.max(box[2], near);
    box[3] = Math.max(box[3], latitude);
  }
  if (box[0] > box[2]) return null;
  const wrap = (degrees: number) =>
    degrees >= -180 && degrees <= 180 ? degrees : ((((degrees + 180) % 360) + 360) % 360) - 180;
  return [wrap(box[0]), box[1], wrap(box[2]), box[3]];
}

function timeSpan(placed: PlacedLog): { startedAt: Date | null; endedAt: Date | null } {
  let first = Infinity;
  let last = -Infinity;
  if (!placed.log.timeIsRelative) {
    for (const time of placed.log.timeMs) {
      if (time < first) first = time;
      if (time > last) last = time;
    }
  }
  return Number.isFinite(first)
    ? { startedAt: new Date(first), endedAt: new Date(last) }
    : { startedAt: null, endedAt: null };
}

/** Notes of the reader about records it left out; their count is the log's `rejected`. */
const REJECTED_NOTES = /reject|ragged|skipped|duplicate-record|cut-short/;

/** What the log's row in the database tells about it; `resistance` where the log can give it. */
export function describePlacedLog(
  placed: PlacedLog,
  notes: readonly LogNote[],
  resistance: ResolvedChannel | null,
): BuiltAnswers["summary"] {
  const { log } = placed;
  const ranges = log.channels.map((channel) => ({ channel, ...measureRange(channel.values) }));
  const channels = ranges.map(({ channel, min, max }) => ({
    id: channel.id as string,
    unit: channel.unit as string,
    min,
    max,
    perRow: channel.perRow,
  }));
  if (resistance) {
    const { min, max } = measureRange(resistance.values);
    if (min !== null) channels.push({ id: "resistance", unit: resistance.unit, min, max, perRow: true });
  }
  return {
    kind: log.kind,
    channels,
    bbox: boundingBox(placed),
    ...timeSpan(placed),
    counts: {
      records: log.records,
      rows: log.rows,
      readings: ranges.reduce((sum, range) => sum + range.n, 0),
      flagged: placed.flags.reduce((sum, bits) => sum + (bits === 0 ? 0 : 1), 0),
      rejected: notes.reduce((sum, note) => sum + (REJECTED_NOTES.test(note.code) ? note.count : 0), 0),
      passes: placed.passes.length,
    },
  };
}

/** The passes as the API tells them. */
export function describePassBodies(placed: PlacedLog): PassBody[] {
  const instant = (timeMs: number) =>
    placed.log.timeIsRelative || !Number.isFinite(timeMs) ? null : new Date(timeMs).toISOString();
  return placed.passes.map((pass) => ({
    pass: pass.pass,
    startedAt: instant(pass.startedAtMs),
    endedAt: instant(pass.endedAtMs),
    headingDeg: Number.isFinite(pass.headingDeg) ? pass.headingDeg : 0,
    lengthM: pass.lengthM,
    records: pass.records,
    headland: pass.headland,
  }));
}
