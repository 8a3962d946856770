import { MARGIN_BY_FORCE } from "@/lib/channels/margin-by-force";

export const PATTERNS = ["plain", "rising", "falling", "across", "upright", "dots"] as const;
export type CategoryPattern = (typeof PATTERNS)[number];

/** One of the names that a channel's readings carry instead of amounts. */
export interface Category {
  /** The number that stands for it. */
  code: number;
  /** Stands in the swatch, so that the legend reads without colours. */
  letter: string;
  name: string;
  meaning: string;
  /** #rrggbb */
  colour: string;
  pattern: CategoryPattern;
}

/** Colours: Tol, Colour Schemes, SRON/EPS/TN/09-002 ("muted"; from memory); pale paper for what asks for nothing. */
const WINE = "#882255";
const ROSE = "#cc6677";
const SAND = "#ddcc77";
const PALE = "#eeece4";
const TEAL = "#44aa99";
const INDIGO = "#332288";

const UNDER_TARGET: Category[] = [
  {
    code: 0,
    letter: "–",
    name: "Not under target",
    meaning: "The margin held the target, less what still counts as on it.",
    colour: PALE,
    pattern: "plain",
  },
  {
    code: 1,
    letter: "U",
    name: "Under target",
    meaning: "Less weight left on the gauge wheels than the target, less what still counts as on it.",
    colour: WINE,
    pattern: "rising",
  },
];

const AT_LIMIT: Category[] = [
  {
    code: 0,
    letter: "–",
    name: "Below the limit",
    meaning: "The machine had force to spare.",
    colour: PALE,
    pattern: "plain",
  },
  {
    code: 1,
    letter: "L",
    name: "At the limit",
    meaning: "The force stood at the highest that the machine gives, to 1 % or the log's own rounding.",
    colour: INDIGO,
    pattern: "falling",
  },
];

const BY_FORCE: Category[] = [
  {
    code: MARGIN_BY_FORCE.shortOfWeight,
    letter: "W",
    name: "Short of weight, or resistance too high",
    meaning: "Under target with the force at its limit.",
    colour: WINE,
    pattern: "rising",
  },
  {
    code: MARGIN_BY_FORCE.nearlyAtLimit,
    letter: "N",
    name: "Nearly at the limit",
    meaning: "Under target with the force at nine tenths of its limit or more.",
    colour: ROSE,
    pattern: "across",
  },
  {
    code: MARGIN_BY_FORCE.setTooLow,
    letter: "S",
    name: "Set too low, or too slow",
    meaning: "Under target with force to spare: consistent with a target or passive setting too low, or a lag.",
    colour: SAND,
    pattern: "dots",
  },
  {
    code: MARGIN_BY_FORCE.inBand,
    letter: "B",
    name: "In band",
    meaning: "On target, give or take what counts as on it.",
    colour: PALE,
    pattern: "plain",
  },
  {
    code: MARGIN_BY_FORCE.targetTooHigh,
    letter: "H",
    name: "Target too high",
    meaning: "Over target while force was still applied.",
    colour: TEAL,
    pattern: "upright",
  },
  {
    code: MARGIN_BY_FORCE.unitWeightTooMuch,
    letter: "O",
    name: "Own weight too much",
    meaning: "Over target with no force applied: the unit's weight alone is too much.",
    colour: INDIGO,
    pattern: "falling",
  },
];

const CATEGORIES: Record<string, readonly Category[] | undefined> = {
  underTarget: UNDER_TARGET,
  atLimit: AT_LIMIT,
  marginByForce: BY_FORCE,
};

/** The names a channel's readings carry, by rising code; null for a channel of amounts. */
export function categoriesOf(channel: string): readonly Category[] | null {
  return Object.hasOwn(CATEGORIES, channel) ? (CATEGORIES[channel] ?? null) : null;
}

/** The name a reading carries; null for an amount, a missing reading, or a mean between two names. */
export function categoryAt(channel: string, value: number): Category | null {
  return categoriesOf(channel)?.find(({ code }) => code === value) ?? null;
}

/** Class edges halfway between the codes, so that each name is a class. */
export function categoryEdges(categories: readonly Category[]): number[] {
  return categories.slice(1).map(({ code }) => code - 0.5);
}

/** Codes of a channel whose readings must never be averaged; 0 for any other. Of a mask, 0 or 1, a mean is a share. */
export function namedCodes(channel: string): number {
  return channel === "marginByForce" ? BY_FORCE.length : 0;
}
