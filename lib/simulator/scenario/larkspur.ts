import type { Polygon } from "geojson";
import { createLocalPlane } from "@/lib/geo/local-plane";
import type { Machine } from "@/lib/machines/machine";
import { fieldBoundary, rectangleRing } from "@/lib/simulator/field-ring";
import { LARKSPUR_COMBINE, LARKSPUR_DRILL, LARKSPUR_DRILL_BALLASTED } from "@/lib/simulator/scenario/larkspur-machines";
import { bandsFromHarvest, type HarvestInput } from "@/lib/simulator/simulate-harvest-log";
import { resolveSimulationOptions, type SimulationInput } from "@/lib/simulator/simulation-options";
import type { FileStyle } from "@/lib/simulator/writers/file-style";

export interface LarkspurField {
  key: "east-quarter" | "mill-bottom";
  name: string;
  farm: string;
  landowner: string;
  /** One sentence on what a reader should find here. */
  story: string;
  boundary: Polygon;
  harvest: LarkspurLog<HarvestInput>;
  seeding: LarkspurLog<SimulationInput>;
}

/** A log to be made: what to simulate and how its file is written. */
export interface LarkspurLog<Input> {
  fileName: string;
  input: Input;
  style: Partial<FileStyle>;
}

const FARM = { farm: "Larkspur Flats", landowner: "Wren Halloway" };

/** What both fields share: winter barley into grain-sorghum stubble, one worn opener, rows behind the tractor's tracks. */
const DRILLING: SimulationInput = {
  machine: LARKSPUR_DRILL,
  headlandM: 14,
  baseResistanceN: 1120,
  soil: { gradientEastNPerM: 0.3, gradientNorthNPerM: -0.5, noiseN: 55, noiseRangeM: 30, seed: 3100 },
  wornRow: { row: 17, extraForceN: 210, marginLossN: 150 },
  wheelTracks: { rows: [6, 7, 18, 19], effectN: 20 },
  rowSpread: { resistanceN: 5, marginZeroN: 4 },
  speedEffectNPerMps: 60,
  startRamp: { lengthM: 5, fromShare: 0.6 },
  controller: { mode: "active", lagS: 0.5, targetMarginN: 450 },
  frameLifts: true,
  depth: { targetM: 0.045, fullDepthMarginN: 400, lossMPerN: 0.00005 },
  noise: { downforceN: 18, marginN: 45, depthM: 0.0025, headingDeg: 0.2, positionM: 0.01 },
  missingShare: 0.0004,
};

/** The drill's own file: short names, pounds-force, inches, miles an hour. */
const IMPERIAL_STYLE: Partial<FileStyle> = {
  naming: "short",
  force: "lbf",
  depth: "in",
  speed: "mph",
  forceDecimals: 0,
};
const SI_STYLE: Partial<FileStyle> = { naming: "plain", force: "N", depth: "mm", speed: "m/s" };

const EAST_ORIGIN: [number, number] = [-98.6124, 38.4171];
const EAST_PLANE = createLocalPlane(...EAST_ORIGIN);
const EAST_RING = rectangleRing(EAST_PLANE, 0, 310, 240);
const EAST_HARVEST: HarvestInput = {
  seed: 3101,
  combine: LARKSPUR_COMBINE,
  origin: EAST_ORIGIN,
  ring: EAST_RING,
  headingDeg: 0,
  startedAt: "2026-09-12T15:20:00.000Z",
};
const EAST_SEEDING: SimulationInput = {
  ...DRILLING,
  seed: 3102,
  origin: EAST_ORIGIN,
  // The last lines were left for the next day, see `LARKSPUR_NEXT_DAY`.
  shape: { kind: "polygon", ring: EAST_RING, lines: { first: 1, last: 38 } },
  headingDeg: 20,
  startedAt: "2026-09-24T14:05:00.000Z",
  bands: bandsFromHarvest(EAST_HARVEST, { widthM: 2.5, sideShiftM: 0.4, contrastN: 240 }),
};

const MILL_ORIGIN: [number, number] = [-98.6391, 38.4046];
const MILL_PLANE = createLocalPlane(...MILL_ORIGIN);
/** Fourteen header widths, so drill and combine run the same fourteen lines. */
const MILL_RING = rectangleRing(MILL_PLANE, 68, 330, 14 * LARKSPUR_COMBINE.headerWidthM);
const MILL_HARVEST: HarvestInput = {
  seed: 3201,
  combine: LARKSPUR_COMBINE,
  origin: MILL_ORIGIN,
  ring: MILL_RING,
  headingDeg: 68,
  startedAt: "2026-09-13T14:40:00.000Z",
};
const MILL_SEEDING: SimulationInput = {
  ...DRILLING,
  seed: 3202,
  origin: MILL_ORIGIN,
  shape: { kind: "polygon", ring: MILL_RING },
  headingDeg: 68,
  // Steered by last season's harvest lines: 6 m of drill every 6.096 m.
  passSpacingM: LARKSPUR_COMBINE.headerWidthM,
  startedAt: "2026-09-26T13:50:00.000Z",
  bands: bandsFromHarvest(MILL_HARVEST, { widthM: 2.5, sideShiftM: 0, contrastN: 240 }),
};

/** Both fields of the demo. Everything is invented: farm, people, places, dates. */
export const LARKSPUR: { machines: Machine[]; fields: LarkspurField[] } = {
  machines: [LARKSPUR_DRILL, LARKSPUR_DRILL_BALLASTED, LARKSPUR_COMBINE],
  fields: [
    {
      ...FARM,
      key: "east-quarter",
      name: "East quarter",
      story:
        "Drilled 20 degrees across the harvest passes: residue bands, a worn opener and a light frame can be told apart.",
      boundary: fieldBoundary(resolveSimulationOptions(EAST_SEEDING), EAST_PLANE),
      harvest: { fileName: "east-quarter-harvest.csv", input: EAST_HARVEST, style: SI_STYLE },
      seeding: { fileName: "east-quarter-seeding.csv", input: EAST_SEEDING, style: IMPERIAL_STYLE },
    },
    {
      ...FARM,
      key: "mill-bottom",
      name: "Mill bottom",
      story:
        "Drilled along the harvest passes: every band falls on the same rows, so band and row cannot be told apart.",
      boundary: fieldBoundary(resolveSimulationOptions(MILL_SEEDING), MILL_PLANE),
      harvest: { fileName: "mill-bottom-harvest.csv", input: MILL_HARVEST, style: SI_STYLE },
      seeding: { fileName: "mill-bottom-seeding.csv", input: MILL_SEEDING, style: SI_STYLE },
    },
  ],
};

/** The rest of East quarter a day later, for people to drag in themselves: opener 17 renewed, more ballast on the frame. */
export const LARKSPUR_NEXT_DAY: LarkspurLog<SimulationInput> & { fieldKey: LarkspurField["key"] } = {
  fieldKey: "east-quarter",
  fileName: "east-quarter-next-day.csv",
  style: { ...IMPERIAL_STYLE, unexplainedColumn: "AUX_3" },
  input: {
    ...EAST_SEEDING,
    seed: 3103,
    shape: { kind: "polygon", ring: EAST_RING, lines: { first: 39, last: 60 } },
    startedAt: "2026-09-25T14:10:00.000Z",
    wornRow: null,
    machine: LARKSPUR_DRILL_BALLASTED,
  },
};
