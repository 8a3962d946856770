import type { LogChannel, MachineLog } from "@/lib/logs/machine-log";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { SIMULATION_DEFAULTS, type SimulationInput } from "@/lib/simulator/simulation-options";
import type { FileStyle } from "@/lib/simulator/writers/file-style";
import { writeWideCsvChunks } from "@/lib/simulator/writers/write-csv";

export type BenchmarkSize = "small" | "large";

const { machine } = SIMULATION_DEFAULTS;
const COMMON: SimulationInput = {
  bands: { headingDeg: 20, periodM: 6.096, widthM: 2.5, sideShiftM: 0, contrastN: 240, through: [-98.612, 38.417] },
  wornRow: { row: 17, extraForceN: 200, marginLossN: 120 },
  soil: { gradientEastNPerM: 0.2, gradientNorthNPerM: 0.1, noiseN: 50, noiseRangeM: 30 },
};
/** Inputs that drive a little farther than the records asked for; the log is cut to the exact number. */
const SIZES: Record<BenchmarkSize, { records: number; input: SimulationInput }> = {
  small: { records: 2_000, input: { ...COMMON, seed: 41, shape: { kind: "block", passes: 10, passLengthM: 200 } } },
  large: {
    records: 60_000,
    input: {
      ...COMMON,
      seed: 42,
      recordIntervalS: 0.2,
      machine: { ...machine, rowCount: 48 },
      shape: { kind: "block", passes: 52, passLengthM: 560 },
    },
  },
};

/** 2 000 records of 24 rows, or 60 000 of 48; downforce, margin and depth. */
export function createBenchmarkLog(size: BenchmarkSize): MachineLog {
  const { records, input } = SIZES[size];
  const { log } = simulateSeedingLog(input);
  if (log.records < records) {
    throw new RangeError(`createBenchmarkLog: drove ${log.records} records, ${records} are needed`);
  }
  return keepFirstRecords(log, records);
}

/** How the benchmark files are written: about 49 MB for the large one. */
export const BENCHMARK_STYLE: Partial<FileStyle> = { force: "N", depth: "mm", forceDecimals: 1, positionDecimals: 7 };

/** The benchmark file piece by piece, for a script to pour into a file: `for (const piece of writeBenchmarkCsv("large"))`. */
export function* writeBenchmarkCsv(size: BenchmarkSize): Generator<string> {
  yield* writeWideCsvChunks(createBenchmarkLog(size), BENCHMARK_STYLE);
}

/** The log's first records. */
export function keepFirstRecords(log: MachineLog, records: number): MachineLog {
  const keepChannel = (channel: LogChannel): LogChannel => ({
    ...channel,
    values: channel.values.slice(0, records * channel.rows),
  });
  return {
    ...log,
    records,
    timeMs: log.timeMs.slice(0, records),
    longitude: log.longitude.slice(0, records),
    latitude: log.latitude.slice(0, records),
    headingDeg: log.headingDeg?.slice(0, records) ?? null,
    speedMps: log.speedMps?.slice(0, records) ?? null,
    working: log.working?.slice(0, records) ?? null,
    loggedPass: log.loggedPass?.slice(0, records) ?? null,
    sourceLine: log.sourceLine.slice(0, records),
    channels: log.channels.map(keepChannel),
  };
}
