import type { MachineLog } from "@/lib/logs/machine-log";
import type { SimulatedLog } from "@/lib/simulator/simulate-seeding-log";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { SIMULATION_DEFAULTS, type SimulationInput } from "@/lib/simulator/simulation-options";

/** A small log without noise, lag or rounding, so that every number can be worked out by hand. */
export const QUIET: SimulationInput = {
  seed: 21,
  shape: { kind: "block", passes: 4, passLengthM: 80 },
  noise: { downforceN: 0, marginN: 0, depthM: 0, headingDeg: 0, positionM: 0 },
  resolution: { downforceN: 0, marginN: 0, depthM: 0 },
  controller: { mode: "active", lagS: 0, targetMarginN: 450 },
};

export const QUIET_BANDS = {
  headingDeg: 70,
  periodM: 6.096,
  widthM: 2.5,
  sideShiftM: 0,
  contrastN: 240,
  through: SIMULATION_DEFAULTS.origin,
};

/** 82 kg under standard gravity. */
export const UNIT_WEIGHT_N = 82 * 9.80665;

export function simulateQuiet(changes: SimulationInput): SimulatedLog {
  return simulateSeedingLog({ ...QUIET, ...changes });
}

export function valuesOf(log: MachineLog, id: string): Float32Array {
  const channel = log.channels.find((one) => one.id === id);
  if (!channel) throw new Error(`valuesOf: the log has no ${id}`);
  return channel.values;
}

/** Plain mean of the working readings that `keep` picks. */
export function meanWhere(
  { log, truth }: SimulatedLog,
  id: string,
  keep: (record: number, row: number) => boolean,
): number {
  let sum = 0;
  let count = 0;
  valuesOf(log, id).forEach((value, at) => {
    const record = Math.floor(at / log.rows);
    if (truth.passOfRecord[record] === 0 || Number.isNaN(value) || !keep(record, (at % log.rows) + 1)) return;
    sum += value;
    count += 1;
  });
  return sum / count;
}
