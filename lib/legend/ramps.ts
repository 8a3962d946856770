import {
  interpolateBrBG,
  interpolateCividis,
  interpolateGreys,
  interpolatePuBu,
  interpolatePuOr,
  interpolateViridis,
  interpolateYlOrBr,
} from "d3-scale-chromatic";
import { formatColour, parseColour } from "@/lib/legend/parse-colour";

/** Published, colour-blind-safe ramps (ColorBrewer, Brewer 2003; cividis, Nunez et al. 2018; viridis, Smith and van der Walt 2015). */
const RAMPS = {
  cividis: { at: interpolateCividis, from: 0.05, to: 1, diverging: false },
  YlOrBr: { at: interpolateYlOrBr, from: 0.08, to: 0.98, diverging: false },
  PuBu: { at: interpolatePuBu, from: 0.1, to: 1, diverging: false },
  Greys: { at: interpolateGreys, from: 0.12, to: 0.92, diverging: false },
  viridis: { at: (t: number) => interpolateViridis(1 - t), from: 0, to: 1, diverging: false },
  PuOr: { at: (t: number) => interpolatePuOr(1 - t), from: 0.04, to: 0.96, diverging: true },
  BrBG: { at: interpolateBrBG, from: 0.06, to: 0.94, diverging: true },
} as const;

export type RampName = keyof typeof RAMPS;
export const RAMP_NAMES = Object.keys(RAMPS) as RampName[];

export function isRampName(text: string): text is RampName {
  return Object.hasOwn(RAMPS, text);
}

export function isDiverging(ramp: RampName): boolean {
  return RAMPS[ramp].diverging;
}

/** The ramp that fits a channel (logged, derived or `other:`). */
export function rampOf(channel: string): RampName {
  if (channel.startsWith("deviation:")) return "BrBG";
  return CHANNEL_RAMPS[channel] ?? "viridis";
}

const CHANNEL_RAMPS: Record<string, RampName | undefined> = {
  downforce: "cividis",
  resistance: "YlOrBr",
  margin: "PuOr",
  depth: "PuBu",
  contact: "Greys",
};

/**
 * Colours of `count` classes as #rrggbb, lowest class first. With `pivot` (the class that holds the target) a diverging
 * ramp keeps its pale middle there, each side running out to its own end.
 */
export function classColours(ramp: RampName, count: number, pivot?: number): string[] {
  const { at, from, to, diverging } = RAMPS[ramp];
  return Array.from({ length: count }, (_, index) => {
    const t = diverging && pivot !== undefined ? pivotedPlace(index, count, pivot) : evenPlace(index, count);
    return formatColour(parseColour(at(from + t * (to - from))));
  });
}

function evenPlace(index: number, count: number): number {
  return count < 2 ? 0.5 : index / (count - 1);
}

function pivotedPlace(index: number, count: number, pivot: number): number {
  if (index === pivot) return 0.5;
  if (index < pivot) return (0.5 * index) / pivot;
  return 0.5 + (0.5 * (index - pivot)) / (count - 1 - pivot);
}
