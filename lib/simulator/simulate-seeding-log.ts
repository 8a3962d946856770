import type { LogChannel, MachineLog } from "@/lib/logs/machine-log";
import type { LocalPlane } from "@/lib/geo/local-plane";
import { describeCoverage } from "@/lib/simulator/describe-coverage";
import { describeChannel, listPasses, weighReadings } from "@/lib/simulator/describe-truth";
import type { Track } from "@/lib/simulator/drive-path-records";
import { frameCapacityN } from "@/lib/simulator/frame-capacity";
import { createGround } from "@/lib/simulator/ground-resistance";
import { describeWeight } from "@/lib/simulator/describe-weight";
import { type PlannedTrack, planTrack } from "@/lib/simulator/plan-track";
import { layOutRows, type RowLayout } from "@/lib/simulator/row-layout";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import { senseChannel } from "@/lib/simulator/sense-channel";
import { switchSections } from "@/lib/simulator/switch-sections";
import { type RowForces, simulateRowForces } from "@/lib/simulator/simulate-row-forces";
import {
  resolveSimulationOptions,
  type SimulationInput,
  type SimulationOptions,
} from "@/lib/simulator/simulation-options";
import type { SimulationTruth } from "@/lib/simulator/simulation-truth";

export interface SimulatedLog {
  log: MachineLog;
  truth: SimulationTruth;
}

/**
 * A seeding log with known causes. Same input, same log, on every machine.
 * Only straight-behind (rigid) implements are modelled: on straight passes a trailed one stands in the same place.
 * Throws a RangeError where the options contradict each other.
 */
export function simulateSeedingLog(input: SimulationInput): SimulatedLog {
  const options = resolveSimulationOptions(input);
  const planned = planTrack(options);
  const layout = layOutRows(options.machine);
  const ground = createGround(options, planned.plane);
  const forces = simulateRowForces({ options, track: planned.track, ground, layout });
  const log = writeDown(options, planned, forces);
  const isOn = switchSections({ options, planned, layout });
  if (isOn) blankSwitchedOff(log, isOn);
  return { log, truth: describeTruth({ options, planned, layout, forces, log }) };
}

function writeDown(options: SimulationOptions, { track, plane }: PlannedTrack, forces: RowForces): MachineLog {
  const heading = createSeededRandom(options.seed, "heading noise");
  const speed = createSeededRandom(options.seed, "speed noise");
  const startMs = Date.parse(options.startedAt);
  return {
    kind: "seeding",
    records: track.records,
    rows: options.machine.rowCount,
    timeMs: track.timeS.map((seconds) => startMs + Math.round(seconds * 1000)),
    timeIsRelative: false,
    ...antennaPositions(options, track, plane),
    headingDeg: Float32Array.from(track.headingRad, (rad) => {
      const degrees = (rad * 180) / Math.PI + options.noise.headingDeg * heading.normal();
      return ((degrees % 360) + 360) % 360;
    }),
    speedMps: Float32Array.from(track.speedMps, (mps) => Math.max(0, mps + options.speed.noiseMps * speed.normal())),
    working: options.logWorking ? Uint8Array.from(track.pass, (pass) => (pass > 0 ? 1 : 0)) : null,
    loggedPass: options.logPassNumbers ? Int32Array.from(track.pass) : null,
    // Line 1 of the written file holds the column names.
    sourceLine: Uint32Array.from({ length: track.records }, (_, record) => record + 2),
    channels: options.channels.map((id) => senseRows(options, track, forces, id)),
  };
}

/** A section that is switched off writes no readings. */
function blankSwitchedOff(log: MachineLog, isOn: Uint8Array): void {
  for (const { values } of log.channels) isOn.forEach((on, at) => on === 0 && (values[at] = NaN));
}

/** The antenna rides `antennaToRowsM` ahead of the line of rows and `antennaRightM` right of its middle. */
function antennaPositions(
  options: SimulationOptions,
  track: Track,
  plane: LocalPlane,
): Pick<MachineLog, "longitude" | "latitude"> {
  const random = createSeededRandom(options.seed, "position noise");
  const { antennaToRowsM, antennaRightM } = options.machine;
  const longitude = new Float64Array(track.records);
  const latitude = new Float64Array(track.records);
  for (let record = 0; record < track.records; record += 1) {
    const sin = Math.sin(track.headingRad[record] ?? 0);
    const cos = Math.cos(track.headingRad[record] ?? 0);
    const eastM = (track.eastM[record] ?? 0) + antennaToRowsM * sin + antennaRightM * cos;
    const northM = (track.northM[record] ?? 0) + antennaToRowsM * cos - antennaRightM * sin;
    const [lon, lat] = plane.toDegrees(
      eastM + options.noise.positionM * random.normal(),
      northM + options.noise.positionM * random.normal(),
    );
    longitude[record] = lon;
    latitude[record] = lat;
  }
  return { longitude, latitude };
}

function senseRows(
  options: SimulationOptions,
  track: Track,
  forces: RowForces,
  id: "downforce" | "margin" | "depth",
): LogChannel {
  const source = {
    downforce: [forces.downforceN, options.noise.downforceN, options.resolution.downforceN],
    margin: [forces.marginN, options.noise.marginN, options.resolution.marginN],
    depth: [forces.depthM, options.noise.depthM, options.resolution.depthM],
  } as const;
  const [truth, noise, resolution] = source[id];
  const values = senseChannel(truth, track.timeS, {
    rows: options.machine.rowCount,
    recordIntervalS: options.recordIntervalS,
    latencyS: options.latencyS[id],
    noise,
    lowest: 0,
    highest: id === "downforce" ? (options.machine.maxDownforceN ?? Infinity) : Infinity,
    zero: id === "margin" ? marginZeros(options) : [],
    driftPerHour: id === "margin" ? options.driftNPerHour : [],
    resolution,
    missingShare: options.missingShare,
    random: createSeededRandom(options.seed, `${id} sensor`),
  });
  return {
    id,
    unit: id === "depth" ? "m" : "N",
    rows: options.machine.rowCount,
    perRow: true,
    values,
    resolution: resolution > 0 ? resolution : null,
  };
}

function marginZeros(options: SimulationOptions): number[] {
  const random = createSeededRandom(options.seed, "margin zeros");
  return Array.from({ length: options.machine.rowCount }, () => options.rowSpread.marginZeroN * random.normal());
}

interface TruthInputs {
  options: SimulationOptions;
  planned: PlannedTrack;
  layout: RowLayout;
  forces: RowForces;
  log: MachineLog;
}

function describeTruth({ options, planned: { track, axes }, layout, forces, log }: TruthInputs): SimulationTruth {
  const passes = listPasses(track);
  const weights = weighReadings(track, layout, passes);
  const distanceM = sumByRecord(weights, layout.rows);
  const all = distanceM.reduce((sum, one) => sum + one, 0);
  const lifted = distanceM.reduce((sum, one, record) => (forces.frameLifted[record] === 1 ? sum + one : sum), 0);
  const { frame } = options.machine;
  return {
    options,
    channels: log.channels.map((channel) => describeChannel(channel, weights)),
    passes,
    bands: options.bands,
    inBandShare: shareInBand(forces.inBand, weights, layout.rows),
    rowEffectN: [...forces.rowEffectN],
    wornRow: options.wornRow,
    wheelTracks: options.wheelTracks,
    coverage:
      options.headland?.downInCorners || options.sectionControl
        ? null
        : describeCoverage({ track, layout, passes, axes }),
    shareLifted: lifted / all,
    liftedM2: lifted * layout.spacingM,
    weight: frame
      ? describeWeight({ frame, sumOfForcesN: forces.sumOfForcesN, distanceM, rowWidthM: layout.spacingM })
      : null,
    maxDownforceN: options.machine.maxDownforceN ?? null,
    frameCapacityN: options.frameLifts && frame ? frameCapacityN(frame) : null,
    passOfRecord: track.pass,
    resistanceN: forces.resistanceN,
    inBand: forces.inBand,
  };
}

/** Distance of all rows of a record together. */
function sumByRecord(weights: Float64Array, rows: number): Float64Array {
  const sums = new Float64Array(weights.length / rows);
  weights.forEach((weight, at) => {
    const record = Math.floor(at / rows);
    sums[record] = (sums[record] ?? 0) + weight;
  });
  return sums;
}

function shareInBand(inBand: Uint8Array, weights: Float64Array, rows: number): number[] {
  return Array.from({ length: rows }, (_, row) => {
    let inside = 0;
    let all = 0;
    for (let at = row; at < weights.length; at += rows) {
      all += weights[at] ?? 0;
      if (inBand[at] === 1) inside += weights[at] ?? 0;
    }
    return all > 0 ? inside / all : 0;
  });
}
