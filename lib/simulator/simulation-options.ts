import type { Seeder } from "@/lib/machines/machine";

/** Residue bands lying across a field. Conventions of the API: `sideShiftM` is right-positive looking along `headingDeg`. */
export interface ResidueBands {
  headingDeg: number;
  periodM: number;
  widthM: number;
  sideShiftM: number;
  /** Opener resistance inside a band minus between bands. */
  contrastN: number;
  /** A point on the centre line of one harvest pass, [longitude, latitude]. */
  through: [number, number];
}

/** One opener past its wear limit. `extraForceN` the controller feels and answers; `marginLossN` it cannot feel. */
export interface WornRow {
  row: number;
  extraForceN: number;
  marginLossN: number;
}

export interface WheelTrackRows {
  rows: number[];
  effectN: number;
}

/** How the ground's resistance changes over the field, on top of `baseResistanceN`. */
export interface SoilTrend {
  gradientEastNPerM: number;
  gradientNorthNPerM: number;
  /** Standard deviation of a smooth random surface, and the distance over which it stays alike (Gaussian correlation). */
  noiseN: number;
  noiseRangeM: number;
  /** Seed of that surface, so that two logs can share one piece of ground; without it the log's own. */
  seed?: number;
}

export type Controller = { mode: "active"; lagS: number; targetMarginN: number } | { mode: "fixed"; forceN: number };

/**
 * `block`: a rectangle laid along the drilling, known exactly. `polygon`: a convex ring of [longitude, latitude]; `lines`
 * drives only some of the lines that fill it, first and last counted from 1 at the left.
 */
export type FieldShape =
  | { kind: "block"; passes: number; passLengthM: number }
  | { kind: "polygon"; ring: [number, number][]; lines?: { first: number; last: number } };

export interface SpeedOptions {
  meanMps: number;
  /** Slow swing of the true speed about its mean. */
  variationMps: number;
  variationPeriodS: number;
  /** Speed while lifted, as a share of the mean. */
  turnShare: number;
  /** White noise of the logged speed only. */
  noiseMps: number;
}

export interface SimulationOptions {
  seed: number;
  machine: Seeder;
  /** Centre of the field, [longitude, latitude]. */
  origin: [number, number];
  shape: FieldShape;
  /** Direction of the odd passes, clockwise from north; even ones run back. */
  headingDeg: number;
  /** Null: the implement's own width. Less overlaps, more leaves skips. */
  passSpacingM: number | null;
  /** Standard deviation of each pass's sideways error; the pass stays straight. */
  passWanderM: number;
  /** Ground left undrilled at each end for turning. */
  headlandM: number;
  /** Rounds drilled along the boundary before the passes (`block` only); lifted in the corners unless `downInCorners`. */
  headland: { rounds: number; downInCorners: boolean } | null;
  /**
   * Sections of so many rows that switch off past the end of their own ground (`polygon` only): passes then run on until the
   * last section has left the field, less the headland.
   */
  sectionControl: { rowsPerSection: number; delayS: number } | null;
  turnRadiusM: number;
  startedAt: string;
  recordIntervalS: number;
  speed: SpeedOptions;
  /** Log the lifted records too (working = 0)? */
  logTurns: boolean;
  logPassNumbers: boolean;
  logWorking: boolean;
  channels: ("downforce" | "margin" | "depth")[];
  baseResistanceN: number;
  bands: ResidueBands | null;
  wornRow: WornRow | null;
  wheelTracks: WheelTrackRows | null;
  /** Lasting differences between healthy rows (standard deviations): what each asks of the ground, and its sensor's zero. */
  rowSpread: { resistanceN: number; marginZeroN: number };
  soil: SoilTrend;
  /** Extra resistance for each m/s a row runs faster than the mean speed. */
  speedEffectNPerMps: number;
  /** Distance over which the applied force builds up after lowering, and the share it starts from. */
  startRamp: { lengthM: number; fromShare: number };
  /** Seconds each channel lags behind the position it is stored with. */
  latencyS: { downforce: number; margin: number; depth: number };
  /** Zero drift of the margin sensors, one entry a row (missing rows do not drift). */
  driftNPerHour: number[];
  controller: Controller;
  /** Let the frame lift where the rows push harder than its weight holds (needs `machine.frame`). */
  frameLifts: boolean;
  depth: { targetM: number; fullDepthMarginN: number; lossMPerN: number };
  noise: { downforceN: number; marginN: number; depthM: number; headingDeg: number; positionM: number };
  /** Step the log rounds each channel to; 0 keeps every digit. */
  resolution: { downforceN: number; marginN: number; depthM: number };
  /** Share of readings the log lost, at random. */
  missingShare: number;
}
export type SimulationInput = Partial<SimulationOptions>;

/** A plain 24-row drill; every option that a caller leaves out comes from this table. */
export const SIMULATION_DEFAULTS: SimulationOptions = {
  seed: 1,
  machine: {
    kind: "seeder",
    name: "Teaching drill",
    rowCount: 24,
    rowSpacingM: 0.25,
    antennaToRowsM: 4.2,
    antennaRightM: 0,
    hitch: "rigid",
    rowUnitMassKg: 82,
    maxDownforceN: 1600,
    targetMarginN: 450,
    marginDeadbandN: 100,
  },
  origin: [-98.612, 38.417],
  shape: { kind: "block", passes: 10, passLengthM: 200 },
  headingDeg: 0,
  passSpacingM: null,
  passWanderM: 0,
  headlandM: 18,
  headland: null,
  sectionControl: null,
  turnRadiusM: 7,
  startedAt: "2026-09-24T14:05:00.000Z",
  recordIntervalS: 0.5,
  speed: { meanMps: 2.4, variationMps: 0.15, variationPeriodS: 70, turnShare: 0.75, noiseMps: 0.02 },
  logTurns: true,
  logPassNumbers: false,
  logWorking: true,
  channels: ["downforce", "margin", "depth"],
  baseResistanceN: 1150,
  bands: null,
  wornRow: null,
  wheelTracks: null,
  rowSpread: { resistanceN: 0, marginZeroN: 0 },
  soil: { gradientEastNPerM: 0, gradientNorthNPerM: 0, noiseN: 0, noiseRangeM: 25 },
  speedEffectNPerMps: 0,
  startRamp: { lengthM: 0, fromShare: 1 },
  latencyS: { downforce: 0, margin: 0, depth: 0 },
  driftNPerHour: [],
  controller: { mode: "active", lagS: 0.6, targetMarginN: 450 },
  frameLifts: false,
  depth: { targetM: 0.045, fullDepthMarginN: 150, lossMPerN: 0.00003 },
  noise: { downforceN: 12, marginN: 40, depthM: 0.002, headingDeg: 0, positionM: 0 },
  resolution: { downforceN: 1, marginN: 1, depthM: 0.0005 },
  missingShare: 0,
};

/** Options with every gap filled. Throws a RangeError naming the option that cannot be simulated. */
export function resolveSimulationOptions(input: SimulationInput): SimulationOptions {
  const options = { ...SIMULATION_DEFAULTS, ...input };
  requirePositive("recordIntervalS", options.recordIntervalS);
  requirePositive("speed.meanMps", options.speed.meanMps);
  requirePositive("turnRadiusM", options.turnRadiusM);
  if (options.headland && options.shape.kind !== "block") {
    throw new RangeError("resolveSimulationOptions: headland rounds need a block, this field is a polygon");
  }
  if (options.sectionControl && options.shape.kind !== "polygon") {
    throw new RangeError("resolveSimulationOptions: section control needs a polygon, this field is a block");
  }
  if (options.frameLifts && !options.machine.frame) {
    throw new RangeError("resolveSimulationOptions: frameLifts needs a machine with a frame");
  }
  return options;
}

function requirePositive(name: string, value: number): void {
  if (!(value > 0)) throw new RangeError(`resolveSimulationOptions: ${name} must be above 0, got ${value}`);
}

export function implementWidthM(machine: Seeder): number {
  return machine.rowCount * machine.rowSpacingM;
}
