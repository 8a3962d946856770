import type { Track } from "@/lib/simulator/drive-path-records";
import { frameCapacityN, STANDARD_GRAVITY_MPS2 } from "@/lib/simulator/frame-capacity";
import type { Ground } from "@/lib/simulator/ground-resistance";
import type { RowLayout } from "@/lib/simulator/row-layout";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import type { SimulationOptions } from "@/lib/simulator/simulation-options";

/** True state of every row unit at every record, row-major by record like a log's channels; no sensor has touched it yet. */
export interface RowForces {
  downforceN: Float32Array;
  marginN: Float32Array;
  depthM: Float32Array;
  /** Opener resistance: applied + unit weight - margin wherever the wheel is on the ground. NaN while lifted. */
  resistanceN: Float32Array;
  inBand: Uint8Array;
  /** One entry a record. */
  sumOfForcesN: Float64Array;
  frameLifted: Uint8Array;
  /** One entry a row: lasting extra resistance, whatever the place. */
  rowEffectN: Float64Array;
}

interface Inputs {
  options: SimulationOptions;
  track: Track;
  ground: Ground;
  layout: RowLayout;
}

/**
 * Vertical balance of each row unit (quasi-static): margin = applied + unit weight - resistance, never below 0 since a
 * wheel cannot pull. The controller answers the resistance with a first-order lag up to its limit; where the rows together
 * push up harder than the frame weighs, the frame lifts and every row's force is cut by the same share.
 */
export function simulateRowForces({ options, track, ground, layout }: Inputs): RowForces {
  const result = emptyForces(track.records, fixedRowEffects(options, layout.rows));
  const resistanceN = new Float64Array(layout.rows);
  const commandedN = new Float64Array(layout.rows);
  const step = { resistanceN, commandedN, pushedN: new Float64Array(layout.rows) };
  const capacityN = options.frameLifts && options.machine.frame ? frameCapacityN(options.machine.frame) : Infinity;
  let startedAt = -1;
  for (let record = 0; record < track.records; record += 1) {
    if (track.pass[record] === 0) continue;
    const starts = record === 0 || track.pass[record] !== track.pass[record - 1];
    if (starts) startedAt = record;
    askGround({ options, track, ground, layout }, record, result, resistanceN);
    const rampShare = startRampShare(options, distanceBetween(track, startedAt, record));
    const sumN = command(options, step, starts, rampShare);
    const keptShare = sumN > capacityN ? capacityN / sumN : 1;
    result.frameLifted[record] = keptShare < 1 ? 1 : 0;
    result.sumOfForcesN[record] = sumN * keptShare;
    settle(options, step, keptShare, record * layout.rows, result);
  }
  return result;
}

function emptyForces(records: number, rowEffectN: Float64Array): RowForces {
  const size = records * rowEffectN.length;
  return {
    downforceN: new Float32Array(size),
    marginN: new Float32Array(size),
    depthM: new Float32Array(size).fill(NaN),
    resistanceN: new Float32Array(size).fill(NaN),
    inBand: new Uint8Array(size),
    sumOfForcesN: new Float64Array(records),
    frameLifted: new Uint8Array(records),
    rowEffectN,
  };
}

/** Resistance that belongs to the row and not to the place, one entry a row. */
function fixedRowEffects(options: SimulationOptions, rows: number): Float64Array {
  const random = createSeededRandom(options.seed, "row spread");
  const effect = Float64Array.from({ length: rows }, () => options.rowSpread.resistanceN * random.normal());
  for (const row of options.wheelTracks?.rows ?? []) {
    effect[row - 1] = (effect[row - 1] ?? 0) + (options.wheelTracks?.effectN ?? 0);
  }
  if (options.wornRow)
    effect[options.wornRow.row - 1] = (effect[options.wornRow.row - 1] ?? 0) + options.wornRow.extraForceN;
  return effect;
}

// kernel: hot loop over every row of every record
function askGround(
  { options, track, ground, layout }: Inputs,
  record: number,
  { inBand, rowEffectN }: RowForces,
  resistanceN: Float64Array,
): void {
  const heading = track.headingRad[record] ?? 0;
  const sin = Math.sin(heading);
  const cos = Math.cos(heading);
  const middleEastM = track.eastM[record] ?? 0;
  const middleNorthM = track.northM[record] ?? 0;
  const fasterMps = (track.speedMps[record] ?? 0) - options.speed.meanMps;
  const turnRate = track.turnRateRadPerS[record] ?? 0;
  for (let row = 0; row < layout.rows; row += 1) {
    const offsetM = layout.offsetM[row] ?? 0;
    const forwardM = layout.forwardM[row] ?? 0;
    const eastM = middleEastM + forwardM * sin + offsetM * cos;
    const northM = middleNorthM + forwardM * cos - offsetM * sin;
    const inside = ground.isInBand(eastM, northM);
    inBand[record * layout.rows + row] = inside ? 1 : 0;
    resistanceN[row] =
      ground.soilN(eastM, northM) +
      (inside ? (options.bands?.contrastN ?? 0) : 0) +
      (rowEffectN[row] ?? 0) +
      options.speedEffectNPerMps * (fasterMps - turnRate * offsetM);
  }
}

interface Step {
  resistanceN: Float64Array;
  commandedN: Float64Array;
  pushedN: Float64Array;
}

/** Moves each row's command towards what its controller wants; returns the sum of forces. */
function command(options: SimulationOptions, step: Step, starts: boolean, rampShare: number): number {
  const { controller, machine } = options;
  const limitN = machine.maxDownforceN ?? Infinity;
  const weightN = machine.rowUnitMassKg * STANDARD_GRAVITY_MPS2;
  const lagS = controller.mode === "active" ? controller.lagS : 0;
  const follow = starts || lagS <= 0 ? 1 : 1 - Math.exp(-options.recordIntervalS / lagS);
  let sumN = 0;
  for (let row = 0; row < step.resistanceN.length; row += 1) {
    const askedN = step.resistanceN[row] ?? 0;
    const idealN = controller.mode === "active" ? controller.targetMarginN + askedN - weightN : controller.forceN;
    const wantedN = Math.min(limitN, Math.max(0, idealN));
    const beforeN = step.commandedN[row] ?? 0;
    const commandedN = beforeN + (wantedN - beforeN) * follow;
    step.commandedN[row] = commandedN;
    step.pushedN[row] = commandedN * rampShare;
    sumN += commandedN * rampShare;
  }
  return sumN;
}

/** Works out margin and depth from the forces that really reach the rows, and stores the record. */
// kernel: writes one record into the result arrays
function settle(options: SimulationOptions, step: Step, keptShare: number, at: number, result: RowForces): void {
  const weightN = options.machine.rowUnitMassKg * STANDARD_GRAVITY_MPS2;
  const { targetM, fullDepthMarginN, lossMPerN } = options.depth;
  for (let row = 0; row < step.pushedN.length; row += 1) {
    // What a worn opener takes unfelt by the controller is part of what the ground asked for.
    const unfeltN = options.wornRow?.row === row + 1 ? options.wornRow.marginLossN : 0;
    const resistanceN = (step.resistanceN[row] ?? 0) + unfeltN;
    const forceN = (step.pushedN[row] ?? 0) * keptShare;
    const balanceN = forceN + weightN - resistanceN;
    result.downforceN[at + row] = forceN;
    result.marginN[at + row] = Math.max(0, balanceN);
    result.depthM[at + row] = Math.max(0, targetM - lossMPerN * Math.max(0, fullDepthMarginN - balanceN));
    result.resistanceN[at + row] = resistanceN;
  }
}

function startRampShare({ startRamp }: SimulationOptions, sinceStartM: number): number {
  if (startRamp.lengthM <= 0 || sinceStartM >= startRamp.lengthM) return 1;
  return startRamp.fromShare + ((1 - startRamp.fromShare) * sinceStartM) / startRamp.lengthM;
}

function distanceBetween(track: Track, from: number, to: number): number {
  return Math.hypot(
    (track.eastM[to] ?? 0) - (track.eastM[from] ?? 0),
    (track.northM[to] ?? 0) - (track.northM[from] ?? 0),
  );
}
