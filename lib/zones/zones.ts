import type { Feature, FeatureCollection, Polygon } from "geojson";
import { resolveChannelOrReason } from "@/lib/channels/resolve-channel";
import { AppError } from "@/lib/errors";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { implementWidthM } from "@/lib/rows/row-geometry";
import { passMayMeet, ringMeets, type Bbox } from "@/lib/zones/plane-window";
import { rowTracks, type RowTrack } from "@/lib/zones/row-track";
import { classRuns, type ClassRun } from "@/lib/zones/runs";
import { stripRing } from "@/lib/zones/strip-polygon";

export interface ZoneProperties {
  row: number;
  pass: number;
  /** 0 below the first class edge. */
  class: number;
  /** From the raw readings: mean weighted by distance; null where the stretch holds none of its own. */
  mean: number | null;
  min: number | null;
  max: number | null;
  n: number;
  areaM2: number;
  /** Seconds since the log's first time. */
  startS: number | null;
  endS: number | null;
}

export interface ZoneOptions {
  /** Class edges, any order. */
  breaks: readonly number[];
  /** Least length of a zone; 0 gives the plain runs of readings in one class. */
  minLengthM?: number;
  bbox?: Bbox;
  distances?: Float32Array;
}

export type ZoneCollection = FeatureCollection<Polygon, ZoneProperties>;

export const DEFAULT_ZONE_LENGTH_M = 5;

/**
 * Polygons of the stretches of each row in one class, after smoothing over half the least length, hysteresis of a twentieth
 * of the narrowest class, and merging of stretches shorter than the least length.
 * @throws AppError unprocessable where the log cannot give the channel, or has it only for the whole machine.
 */
export function buildZones(placed: PlacedLog, channelId: string, options: ZoneOptions): ZoneCollection {
  const resolved = resolveChannelOrReason(placed, channelId);
  if (!resolved.ok) throw new AppError("unprocessable", resolved.error, { detailCode: "channel_not_available" });
  const channel = resolved.value;
  if (!channel.perRow) {
    const message = `"${channelId}" is logged once for the whole machine, so there are no zones of rows.`;
    throw new AppError("unprocessable", message, { detailCode: "channel_not_per_row" });
  }
  const distances = options.distances ?? rowDistances(placed);
  const runOptions = {
    breaks: [...options.breaks].sort((a, b) => a - b),
    minLengthM: options.minLengthM ?? DEFAULT_ZONE_LENGTH_M,
  };
  const margin = implementWidthM(placed.geometry);
  const { bbox } = options;
  const features = placed.passes
    .filter((pass) => !bbox || passMayMeet(placed, pass, bbox, margin))
    .flatMap((pass) => rowTracks(placed, channel, distances, pass))
    .flatMap((track) => classRuns(track, runOptions).map((run) => zoneFeature(placed, track, run)))
    .filter((zone) => !bbox || ringMeets(zone.geometry.coordinates[0]!, bbox));
  return { type: "FeatureCollection", features };
}

function zoneFeature(placed: PlacedLog, track: RowTrack, run: ClassRun): Feature<Polygon, ZoneProperties> {
  const { offsetM, forwardM, widthM } = placed.geometry;
  const row = track.row - 1;
  const half = widthM[row]! / 2;
  const strip = { leftM: offsetM[row]! - half, rightM: offsetM[row]! + half, forwardM: forwardM[row]! };
  const steps = track.steps.slice(run.first, run.last + 1);
  const numbers = readNumbers(track, run);
  return {
    type: "Feature",
    geometry: { type: "Polygon", coordinates: [stripRing(placed, strip, steps)] },
    properties: {
      row: track.row,
      pass: track.pass.pass,
      class: run.class,
      ...numbers,
      areaM2: run.lengthM * widthM[row]!,
      startS: secondsAt(placed, steps[0]!.record),
      endS: secondsAt(placed, steps[steps.length - 1]!.record),
    },
  };
}

function readNumbers(
  { values, lengthsM }: RowTrack,
  run: ClassRun,
): Pick<ZoneProperties, "mean" | "min" | "max" | "n"> {
  let [sum, weight, plain, n] = [0, 0, 0, 0];
  let [min, max] = [Infinity, -Infinity];
  for (let i = run.first; i <= run.last; i++) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    sum += value * lengthsM[i]!;
    weight += lengthsM[i]!;
    plain += value;
    n++;
    min = Math.min(min, value);
    max = Math.max(max, value);
  }
  if (n === 0) return { mean: null, min: null, max: null, n };
  return { mean: weight > 0 ? sum / weight : plain / n, min, max, n };
}

function secondsAt(placed: PlacedLog, record: number): number | null {
  const started = placed.log.timeMs.find((time) => Number.isFinite(time)) ?? NaN;
  const seconds = (placed.log.timeMs[record]! - started) / 1000;
  return Number.isFinite(seconds) ? seconds : null;
}
