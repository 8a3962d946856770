import { ticks } from "d3-array";
import {
  areClassEdges,
  CONTACT_LOAD_EDGES_LBF,
  CONTACT_LOAD_EDGES_N,
  edgesAroundTarget,
  equalEdges,
  type Histogram,
  quantileEdges,
} from "@/lib/legend/class-edges";
import { categoriesOf } from "@/lib/legend/categories";
import { naturalEdges } from "@/lib/legend/natural-edges";
import { equalDistanceEdges, type ValueDistribution } from "@/lib/legend/value-distribution";

export const EDGE_PRESETS = ["target", "contact-load", "round", "equal", "quantile", "natural"] as const;
export type EdgePreset = (typeof EDGE_PRESETS)[number];

export interface EdgeContext {
  channel: string;
  histogram: Histogram;
  /** Distance at each value; without it classes alike in size are read off the histogram. */
  distribution?: ValueDistribution;
  /** What the machine was set to hold, and how far off is still on target; null where nobody said. */
  targetMarginN: number | null;
  marginDeadbandN: number | null;
  /** SI units in one shown unit, so that round edges are round to the reader. */
  shownFactor: number;
}

/** Classes of equal width and of equal distance. */
const CLASSES = 6;
/** Tolerance where the machine's own is not known. Common practice, no source. */
const GUESSED_DEADBAND_N = 100;

/** Presets that make sense for a channel, the default first; none for names, whose classes are fixed. */
export function presetsFor({ channel, targetMarginN, distribution }: EdgeContext): EdgePreset[] {
  if (categoriesOf(channel)) return [];
  const anyChannel: EdgePreset[] = ["round", "equal", "quantile", ...(distribution ? (["natural"] as const) : [])];
  if (channel !== "margin") return anyChannel;
  return targetMarginN === null ? ["contact-load", ...anyChannel] : ["target", "contact-load", ...anyChannel];
}

/** The edges of a preset in SI, always rising and at least one. */
export function proposeEdges(preset: EdgePreset, context: EdgeContext): number[] {
  const { histogram } = context;
  const edges = edgesOf(preset, context);
  return areClassEdges(edges) ? edges : [(histogram.minimum + histogram.maximum) / 2];
}

function edgesOf(preset: EdgePreset, context: EdgeContext): number[] {
  const { histogram, targetMarginN, marginDeadbandN } = context;
  switch (preset) {
    case "target":
      return targetMarginN === null ? [] : targetEdges(context, targetMarginN, marginDeadbandN || GUESSED_DEADBAND_N);
    case "contact-load":
      return isPounds(context)
        ? CONTACT_LOAD_EDGES_LBF.map((edge) => edge * context.shownFactor)
        : [...CONTACT_LOAD_EDGES_N];
    case "equal":
      return roundIfRising(equalEdges(histogram.minimum, histogram.maximum, CLASSES), context.shownFactor);
    case "quantile":
      return context.distribution
        ? equalDistanceEdges(context.distribution, CLASSES)
        : quantileEdges(histogram, CLASSES);
    case "natural":
      return context.distribution ? naturalEdges(context.distribution, CLASSES) : [];
    case "round":
      return context.channel.startsWith("deviation:") ? roundAroundZero(context) : roundEdges(context);
  }
}

/** Pounds-force, exact (NIST SP 811). */
const POUND_FORCE_N = 4.4482216152605;

function isPounds({ shownFactor }: EdgeContext): boolean {
  return Math.abs(shownFactor / POUND_FORCE_N - 1) < 1e-6;
}

/** A step of the reader's unit: a power of ten, small beside what the edges span. */
function roundStep(spanSi: number, shownFactor: number): number {
  const span = Math.abs(spanSi) / shownFactor;
  const step = span > 0 && Number.isFinite(span) ? 10 ** Math.floor(Math.log10(span / 20)) : 1;
  return step * shownFactor;
}

/** Edges as round numbers of the reader's unit, where they still rise then. */
function roundIfRising(edges: number[], shownFactor: number): number[] {
  const step = roundStep((edges.at(-1) ?? 0) - (edges[0] ?? 0), shownFactor);
  const rounded = edges.map((edge) => Math.round(edge / step) * step);
  return areClassEdges(rounded) ? rounded : edges;
}

/** Round in the reader's unit but for the two one tolerance off: there a reading begins to count as off target. */
// kernel: the context and the two numbers found in it.
function targetEdges({ shownFactor }: EdgeContext, target: number, tolerance: number): number[] {
  const exact = edgesAroundTarget(target, tolerance);
  const rounded = roundIfRising(exact, shownFactor).map((edge, i) => (i === 1 || i === 4 ? exact[i]! : edge));
  return areClassEdges(rounded) ? rounded : exact;
}

/** Round numbers of the reader's unit within the middle 96 % of the readings, so that a few strays do not use up the classes. */
function roundEdges({ histogram, shownFactor }: EdgeContext): number[] {
  const [low, high] = middleRange(histogram);
  return ticks(low / shownFactor, high / shownFactor, CLASSES - 1).map((tick) => tick * shownFactor);
}

/** The same, alike on both sides of 0 with 0 inside the middle class. */
function roundAroundZero({ histogram, shownFactor }: EdgeContext): number[] {
  const reach = Math.max(...middleRange(histogram).map(Math.abs)) / shownFactor;
  const [step = 1] = ticks(0, reach, 3).filter((tick) => tick > 0);
  return [-2, -1, 1, 2].map((side) => side * step * shownFactor);
}

function middleRange(histogram: Histogram): [number, number] {
  const fiftieths = quantileEdges(histogram, 50);
  return [fiftieths[0] ?? histogram.minimum, fiftieths.at(-1) ?? histogram.maximum];
}
