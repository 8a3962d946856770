import { createLocalPlane, type LocalPlane } from "@/lib/geo/local-plane";
import type { LogChannel, MachineLog } from "@/lib/logs/machine-log";
import type { Combine } from "@/lib/machines/machine";
import { buildPath } from "@/lib/simulator/build-path";
import { drivePathRecords, type Track } from "@/lib/simulator/drive-path-records";
import { listPasses } from "@/lib/simulator/describe-truth";
import { createFieldAxes, type FieldAxes, type PlannedPass, planPassesInPolygon } from "@/lib/simulator/plan-passes";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import type { ResidueBands, SpeedOptions } from "@/lib/simulator/simulation-options";
import type { PassTruth } from "@/lib/simulator/simulation-truth";

export interface HarvestOptions {
  seed: number;
  combine: Combine;
  /** Centre of the local plane, [longitude, latitude]. */
  origin: [number, number];
  /** Convex field, ring of [longitude, latitude]. */
  ring: [number, number][];
  headingDeg: number;
  /** Ground at each end where the combine turns. */
  headlandM: number;
  turnRadiusM: number;
  startedAt: string;
  recordIntervalS: number;
  speed: SpeedOptions;
  yieldKgPerM2: number;
  /** Relative yield change across the field, west to east, for each metre. */
  yieldTrendPerM: number;
  /** Relative white noise of the flow sensor. */
  flowNoise: number;
  /** Seconds between cutting and the flow sensor. */
  grainDelayS: number;
  moisture: number;
}

/** Grain sorghum cut with an 8-row header; callers give field, seed and combine. */
export const HARVEST_DEFAULTS = {
  headingDeg: 0,
  headlandM: 12,
  turnRadiusM: 7,
  startedAt: "2026-09-12T15:20:00.000Z",
  recordIntervalS: 1,
  speed: { meanMps: 1.9, variationMps: 0.15, variationPeriodS: 90, turnShare: 0.8, noiseMps: 0.02 },
  yieldKgPerM2: 0.52,
  yieldTrendPerM: 0.0004,
  flowNoise: 0.06,
  grainDelayS: 0,
  moisture: 0.148,
} satisfies Partial<HarvestOptions>;
export type HarvestInput = Pick<HarvestOptions, "seed" | "combine" | "origin" | "ring"> & Partial<HarvestOptions>;

export interface HarvestTruth {
  options: HarvestOptions;
  passes: PassTruth[];
  /** Middle of the header at both ends of each line, [longitude, latitude], in driving order. */
  lines: [[number, number], [number, number]][];
}

/**
 * The combine's passes that laid the residue: grain flow, moisture and cut width, one value a record. The logged position
 * is the middle of the header.
 */
export function simulateHarvestLog(input: HarvestInput): { log: MachineLog; truth: HarvestTruth } {
  const options: HarvestOptions = { ...HARVEST_DEFAULTS, ...input };
  const plane = createLocalPlane(...options.origin);
  const axes = createFieldAxes(options.headingDeg);
  const lines = harvestLines(options, plane, axes);
  const track = drivePathRecords({
    segments: buildPath({ axes, passes: lines, headland: null, turnRadiusM: options.turnRadiusM }),
    intervalS: options.recordIntervalS,
    speed: options.speed,
    random: createSeededRandom(options.seed, "harvest speed"),
  });
  const ends = lines.map((line, index) => endsInOrder(line, index % 2 === 0, axes, plane));
  return { log: writeDown(options, track, plane), truth: { options, passes: listPasses(track), lines: ends } };
}

/** The bands that a harvest leaves when its spreader throws `widthM` wide: one along every line, centred on its first. */
export function bandsFromHarvest(
  input: HarvestInput,
  spread: { widthM: number; sideShiftM: number; contrastN: number },
): ResidueBands {
  const options: HarvestOptions = { ...HARVEST_DEFAULTS, ...input };
  const plane = createLocalPlane(...options.origin);
  const axes = createFieldAxes(options.headingDeg);
  const first = harvestLines(options, plane, axes)[0];
  if (!first) throw new RangeError("bandsFromHarvest: the field is too small for one harvest pass");
  return {
    // A band has a direction but no sense: 0 up to 180. Turned round, its right is the other side.
    headingDeg: ((options.headingDeg % 180) + 180) % 180,
    periodM: options.combine.headerWidthM,
    ...spread,
    sideShiftM: isTurnedRound(options.headingDeg) ? -spread.sideShiftM : spread.sideShiftM,
    through: plane.toDegrees(...axes.toPlane((first.fromAlongM + first.toAlongM) / 2, first.acrossM)),
  };
}

function isTurnedRound(headingDeg: number): boolean {
  return ((headingDeg % 360) + 360) % 360 >= 180;
}

function harvestLines(options: HarvestOptions, plane: LocalPlane, axes: FieldAxes): PlannedPass[] {
  const { headerWidthM } = options.combine;
  return planPassesInPolygon({
    ring: options.ring.map(([longitude, latitude]) => axes.fromPlane(...plane.toPlane(longitude, latitude))),
    widthM: headerWidthM,
    spacingM: headerWidthM,
    headlandM: options.headlandM,
    minimumLengthM: 20,
  });
}

// kernel: a line, its direction of travel and the two ways of naming a place
function endsInOrder(
  line: PlannedPass,
  forward: boolean,
  axes: FieldAxes,
  plane: LocalPlane,
): [[number, number], [number, number]] {
  const from = plane.toDegrees(...axes.toPlane(line.fromAlongM, line.acrossM));
  const to = plane.toDegrees(...axes.toPlane(line.toAlongM, line.acrossM));
  return forward ? [from, to] : [to, from];
}

function writeDown(options: HarvestOptions, track: Track, plane: LocalPlane): MachineLog {
  const startMs = Date.parse(options.startedAt);
  const longitude = new Float64Array(track.records);
  const latitude = new Float64Array(track.records);
  for (let record = 0; record < track.records; record += 1) {
    const [lon, lat] = plane.toDegrees(track.eastM[record] ?? 0, track.northM[record] ?? 0);
    longitude[record] = lon;
    latitude[record] = lat;
  }
  return {
    kind: "harvest",
    records: track.records,
    rows: 1,
    timeMs: track.timeS.map((seconds) => startMs + Math.round(seconds * 1000)),
    timeIsRelative: false,
    longitude,
    latitude,
    headingDeg: Float32Array.from(track.headingRad, (rad) => ((((rad * 180) / Math.PI) % 360) + 360) % 360),
    speedMps: Float32Array.from(track.speedMps),
    working: Uint8Array.from(track.pass, (pass) => (pass > 0 ? 1 : 0)),
    loggedPass: null,
    sourceLine: Uint32Array.from({ length: track.records }, (_, record) => record + 2),
    channels: [flowChannel(options, track), moistureChannel(options, track), swathChannel(options, track)],
  };
}

function flowChannel(options: HarvestOptions, track: Track): LogChannel {
  const random = createSeededRandom(options.seed, "grain flow");
  const delay = Math.round(options.grainDelayS / options.recordIntervalS);
  const values = Float32Array.from({ length: track.records }, (_, record) => {
    const cut = record - delay;
    if (cut < 0 || track.pass[cut] === 0) return 0;
    const trend = 1 + options.yieldTrendPerM * (track.eastM[cut] ?? 0);
    const flow = options.yieldKgPerM2 * trend * options.combine.headerWidthM * (track.speedMps[cut] ?? 0);
    return Math.max(0, Math.round(flow * (1 + options.flowNoise * random.normal()) * 100) / 100);
  });
  return { id: "yieldFlow", unit: "kg/s", rows: 1, perRow: false, values, resolution: 0.01 };
}

function moistureChannel(options: HarvestOptions, track: Track): LogChannel {
  const random = createSeededRandom(options.seed, "grain moisture");
  const values = Float32Array.from({ length: track.records }, (_, record) =>
    track.pass[record] === 0 ? NaN : Math.round((options.moisture + 0.004 * random.normal()) * 1000) / 1000,
  );
  return { id: "moisture", unit: "fraction", rows: 1, perRow: false, values, resolution: 0.001 };
}

function swathChannel(options: HarvestOptions, track: Track): LogChannel {
  const values = new Float32Array(track.records).fill(options.combine.headerWidthM);
  return { id: "swathWidth", unit: "m", rows: 1, perRow: false, values, resolution: null };
}
