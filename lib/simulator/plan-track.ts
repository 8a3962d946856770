import { createLocalPlane, type LocalPlane } from "@/lib/geo/local-plane";
import { buildPath } from "@/lib/simulator/build-path";
import { drivePathRecords, type Track } from "@/lib/simulator/drive-path-records";
import { blockHalfSides, fieldRing } from "@/lib/simulator/field-ring";
import {
  createFieldAxes,
  type FieldAxes,
  planBlockPasses,
  type PlannedPass,
  planPassesInPolygon,
} from "@/lib/simulator/plan-passes";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import { implementWidthM, type SimulationOptions } from "@/lib/simulator/simulation-options";

/** Lines shorter than this are not worth lowering the drill for. */
const SHORTEST_PASS_M = 20;

export interface PlannedTrack {
  plane: LocalPlane;
  axes: FieldAxes;
  track: Track;
}

/** Plans the passes, drives them, and returns the middle of the row line at every record, lifted ones included. */
export function planTrack(options: SimulationOptions): PlannedTrack {
  const plane = createLocalPlane(...options.origin);
  const axes = createFieldAxes(options.headingDeg);
  const widthM = implementWidthM(options.machine);
  const segments = buildPath({
    axes,
    passes: wander(linesOf(options, plane, axes), options),
    headland: options.headland ? { ...options.headland, ...blockHalfSides(options), widthM } : null,
    turnRadiusM: options.turnRadiusM,
  });
  const track = drivePathRecords({
    segments,
    intervalS: options.recordIntervalS,
    speed: options.speed,
    random: createSeededRandom(options.seed, "speed"),
  });
  return { plane, axes, track: options.logTurns ? track : keepWorking(track) };
}

function linesOf(options: SimulationOptions, plane: LocalPlane, axes: FieldAxes): PlannedPass[] {
  const widthM = implementWidthM(options.machine);
  const spacingM = options.passSpacingM ?? widthM;
  if (options.shape.kind === "block") return planBlockPasses(options.shape.passes, options.shape.passLengthM, spacingM);
  const passes = planPassesInPolygon({
    ring: fieldRing(options, plane, axes),
    widthM,
    spacingM,
    headlandM: options.headlandM,
    minimumLengthM: SHORTEST_PASS_M,
    runsOut: options.sectionControl !== null,
  });
  const { first, last } = options.shape.lines ?? { first: 1, last: passes.length };
  const driven = passes.slice(first - 1, last);
  if (driven.length === 0)
    throw new RangeError("planTrack: the field is too small for one pass, or none of its lines is driven");
  return driven;
}

function wander(passes: PlannedPass[], options: SimulationOptions): PlannedPass[] {
  const random = createSeededRandom(options.seed, "pass wander");
  return passes.map((pass) => ({ ...pass, acrossM: pass.acrossM + options.passWanderM * random.normal() }));
}

/** The track without its lifted records, as a machine logs that pauses in turns. */
function keepWorking(track: Track): Track {
  const keep = <T extends Float64Array | Int32Array>(values: T): T =>
    values.filter((_, record) => track.pass[record] !== 0) as T;
  const pass = keep(track.pass);
  return {
    records: pass.length,
    timeS: keep(track.timeS),
    eastM: keep(track.eastM),
    northM: keep(track.northM),
    headingRad: keep(track.headingRad),
    speedMps: keep(track.speedMps),
    turnRateRadPerS: keep(track.turnRateRadPerS),
    pass,
  };
}
