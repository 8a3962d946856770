import { estimateDelay, type DelayEstimate } from "@/lib/alignment/estimate-delay";
import { buildLog } from "@/lib/build/build-log";
import { resolveChannel } from "@/lib/channels/resolve-channel";
import type { MachineLog } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { Seeder } from "@/lib/machines/machine";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { SIMULATION_DEFAULTS, type SimulationInput } from "@/lib/simulator/simulation-options";

const { machine, soil } = SIMULATION_DEFAULTS;

/** A field whose ground shows in the margin: a fixed force, so that margin = force + weight - resistance. */
export function textured(seed: number, latencyS: number, given: SimulationInput = {}): SimulationInput {
  return {
    seed,
    shape: { kind: "block", passes: 10, passLengthM: 160 },
    soil: { ...soil, noiseN: 120, noiseRangeM: 10 },
    controller: { mode: "fixed", forceN: 800 },
    channels: ["margin"],
    latencyS: { downforce: latencyS, margin: latencyS, depth: latencyS },
    ...given,
  };
}

export function place(log: MachineLog, drill: Seeder | null = machine): PlacedLog {
  const built = buildLog(log, drill);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

export function estimate(placed: PlacedLog, channel = "margin"): DelayEstimate {
  const resolved = resolveChannel(placed, channel);
  if (!resolved) throw new Error(`no ${channel}`);
  return estimateDelay(placed, resolved);
}

export function estimateSimulated(input: SimulationInput, drill: Seeder = machine): DelayEstimate {
  return estimate(place(simulateSeedingLog(input).log, drill), input.channels?.[0]);
}

export function holds(interval: readonly [number, number] | null, value: number): boolean {
  return interval !== null && interval[0] <= value && value <= interval[1];
}

export const SEEDS = Array.from({ length: 40 }, (_, k) => k + 1);
