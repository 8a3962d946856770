import type { Feature, FeatureCollection, MultiPolygon, Polygon, Position } from "geojson";
import { resolveChannelOrReason } from "@/lib/channels/resolve-channel";
import { AppError } from "@/lib/errors";
import { cutAtAntimeridian } from "@/lib/geo/cut-at-antimeridian";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { passSteps } from "@/lib/rows/pass-members";
import { rowDistances } from "@/lib/rows/row-distances";
import { implementWidthM } from "@/lib/rows/row-geometry";
import { ringMeets, stepsNear, type Bbox } from "@/lib/zones/plane-window";
import { rowTracks, type RowTrack, type TrackSource } from "@/lib/zones/row-track";
import { classRuns, type ClassRun, type RunOptions } from "@/lib/zones/runs";
import { outerStrip, outlinePass, stripRing, type PassOutline } from "@/lib/zones/strip-polygon";

export interface ZoneProperties {
  row: number;
  pass: number;
  /** 0 below the first class edge. */
  class: number;
  /** From the raw readings: mean weighted by distance; null where the stretch holds none of its own, and where readings are names. */
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

export type ZoneCollection = FeatureCollection<Polygon | MultiPolygon, ZoneProperties>;

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
  const source = { placed, channel, distances: options.distances ?? rowDistances(placed) };
  const runOptions = {
    breaks: [...options.breaks].sort((a, b) => a - b),
    minLengthM: options.minLengthM ?? DEFAULT_ZONE_LENGTH_M,
    isNamed: channel.isCode,
    bbox: options.bbox,
  };
  const features = placed.passes.flatMap((pass) => passZones(source, pass, runOptions));
  return { type: "FeatureCollection", features };
}

/** Corners closer than this to the line between their neighbours are left out: below what a receiver can tell. */
export const OUTLINE_TOLERANCE_M = 0.03;

function passZones(source: TrackSource, pass: Pass, { bbox, ...runOptions }: RunOptions & { bbox?: Bbox }): Zone[] {
  const { placed } = source;
  const steps = passSteps(placed, pass).filter((step) => step.before >= 0 || step.after >= 0);
  const near = bbox
    ? stepsNear(placed, steps, { bbox, marginM: implementWidthM(placed.geometry) + LONGEST_STEP_M })
    : { first: 0, last: steps.length - 1 };
  if (!near || steps.length === 0) return [];
  const outline = outlinePass(placed, steps, { outer: outerStrip(placed), toleranceM: OUTLINE_TOLERANCE_M });
  return rowTracks(source, pass, steps).flatMap((track) =>
    classRuns(track, runOptions)
      .filter((run) => run.last >= near.first && run.first <= near.last)
      .map((run) => ({ run, ring: zoneRing({ placed, outline }, track, run) }))
      .filter(({ ring }) => !bbox || ringMeets(ring, bbox))
      .map(({ run, ring }) => zoneFeature({ placed, outline }, track, { run, ring, isNamed: runOptions.isNamed })),
  );
}

/** A cell reaches back to the record before; no pass has a longer step than this. */
const LONGEST_STEP_M = 20;

type Zone = Feature<Polygon | MultiPolygon, ZoneProperties>;

interface DrawnLog {
  placed: PlacedLog;
  outline: PassOutline;
}

/** Ground of a row over a run of steps, as a ring. */
export function zoneRing({ placed, outline }: DrawnLog, track: RowTrack, run: ClassRun): Position[] {
  const { offsetM, forwardM, widthM } = placed.geometry;
  const row = track.row - 1;
  const half = widthM[row]! / 2;
  const strip = { leftM: offsetM[row]! - half, rightM: offsetM[row]! + half, forwardM: forwardM[row]! };
  return stripRing(placed, outline, { strip, first: run.first, last: run.last });
}

function zoneFeature(
  { placed, outline }: DrawnLog,
  track: RowTrack,
  { run, ring, isNamed = false }: { run: ClassRun; ring: Position[]; isNamed?: boolean },
): Zone {
  return {
    type: "Feature",
    geometry: cutAtAntimeridian([ring]),
    properties: {
      row: track.row,
      pass: track.pass.pass,
      class: run.class,
      ...readNumbers(track, run, isNamed),
      areaM2: run.lengthM * placed.geometry.widthM[track.row - 1]!,
      startS: secondsAt(placed, outline.steps[run.first]!.record),
      endS: secondsAt(placed, outline.steps[run.last]!.record),
    },
  };
}

/** Numbers of a run from the raw readings. */
export function readNumbers(
  { values, lengthsM }: RowTrack,
  run: ClassRun,
  isNamed: boolean,
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
  if (n === 0 || isNamed) return { mean: null, min: null, max: null, n };
  return { mean: weight > 0 ? sum / weight : plain / n, min, max, n };
}

/** Seconds since the log's first time. */
export function secondsAt(placed: PlacedLog, record: number): number | null {
  const started = placed.log.timeMs.find((time) => Number.isFinite(time)) ?? NaN;
  const seconds = (placed.log.timeMs[record]! - started) / 1000;
  return Number.isFinite(seconds) ? seconds : null;
}
