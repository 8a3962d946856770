import type { ResidueBands, SimulationOptions, WheelTrackRows, WornRow } from "@/lib/simulator/simulation-options";

/** Distance-weighted facts of one row in one stored channel (weights as the API states them). */
export interface RowTruth {
  row: number;
  n: number;
  distanceM: number;
  mean: number;
  /** Population standard deviation (weights sum to the distance). */
  sd: number;
  min: number;
  max: number;
}

export interface ChannelTruth {
  id: "downforce" | "margin" | "depth";
  unit: "N" | "m";
  rows: RowTruth[];
}

export interface PassTruth {
  pass: number;
  /** Index of the first record in the log, from 0. */
  firstRecord: number;
  records: number;
  headingDeg: number;
  /** From the first to the last record. */
  lengthM: number;
}

export interface CoverageTruth {
  sweptM2: number;
  coveredM2: number;
  overlapM2: number;
  /** Gaps between neighbouring passes over their common length. */
  skippedM2: number;
}

/** Headroom = load on the frame's wheels less the least they need; lifted stretches count as minus that least load. */
export interface WeightTruth {
  headroomP05N: number;
  headroomP50N: number;
  /** Share of the working distance, and its area, with less than the least wheel load. */
  shareBelowMinimum: number;
  belowMinimumM2: number;
}

/** What really was, for holding the engine to it. */
export interface SimulationTruth {
  options: SimulationOptions;
  channels: ChannelTruth[];
  passes: PassTruth[];
  bands: ResidueBands | null;
  /** Share of each row's distance that lay in a band, row 1 first. */
  inBandShare: number[];
  /** Lasting extra resistance of each row: spread, wheel track and wear the controller feels. */
  rowEffectN: number[];
  wornRow: WornRow | null;
  wheelTracks: WheelTrackRows | null;
  /** Null where the implement worked through curves or switched sections off. */
  coverage: CoverageTruth | null;
  /** Share of the working distance (and its area) with the frame's wheels off the ground. */
  shareLifted: number;
  liftedM2: number;
  /** Null where the machine has no frame. */
  weight: WeightTruth | null;
  maxDownforceN: number | null;
  frameCapacityN: number | null;
  /** Pass of each record of the log, 0 while lifted. */
  passOfRecord: Int32Array;
  /** True resistance and band of each reading, laid out like a channel; NaN while lifted. */
  resistanceN: Float32Array;
  inBand: Uint8Array;
}
