/** One number of a rule, SI, with the suffix of its unit in its name. */
export interface RuleNumber {
  /** In words, after which the number stands: "within", "at least". */
  label: string;
  /** SI unit, `m/s2` for accelerations, `1` for bare numbers and counts. */
  unit: string;
  standard: number;
  minimum: number;
  maximum: number;
  /** Whole numbers only. */
  whole?: boolean;
  /** The channel whose readings it bounds. */
  channel?: string;
}

/** `record`: everything logged at that moment; `reading`: single readings of single rows. */
export type RuleLevel = "record" | "reading";

export interface RuleFacts {
  level: RuleLevel;
  label: string;
  /** What it takes out, as the end of "leaves out readings that …". */
  words: string;
  /** On before anybody chose. */
  on: boolean;
  /** Null, or why it cannot be switched off. */
  fixed: string | null;
  numbers: Record<string, RuleNumber>;
}

const metres = (label: string, standard: number, maximum = 200): RuleNumber => ({
  label,
  unit: "m",
  standard,
  minimum: 0,
  maximum,
});
const seconds = (label: string, standard: number): RuleNumber => ({
  label,
  unit: "s",
  standard,
  minimum: 0,
  maximum: 120,
});
const speed = (label: string, standard: number): RuleNumber => ({
  label,
  unit: "m/s",
  standard,
  minimum: 0,
  maximum: 50,
});
const bound = (channel: string, label: string, of: { unit: string; standard: number }): RuleNumber => ({
  label,
  minimum: -1e6,
  maximum: 1e6,
  channel,
  ...of,
});

/**
 * The rules in the order in which they take readings out (steps after Simbahan et al. 2004 and Sudduth & Drummond 2007).
 * Numbers are common practice, all to be changed by whoever knows the machine. Rules that are on from the start are those
 * without which no reading has a place; all others wait for a person.
 */
export const CLEANING_RULES = {
  "no-position": {
    level: "record",
    label: "No position",
    words: "have no usable position: missing, out of range, or 0, 0",
    on: true,
    fixed: "A record without a position stands nowhere on the ground.",
    numbers: {},
  },
  "duplicate-time": {
    level: "record",
    label: "Time repeated",
    words: "carry the time of the record before, or an earlier one",
    on: false,
    fixed: null,
    numbers: {},
  },
  "impossible-step": {
    level: "record",
    label: "Impossible step",
    words: "jump further than the machine could have driven: over 1.5 times speed times time, and 1 m",
    on: true,
    fixed: "Its position is wrong, so its rows would stand in the wrong place.",
    numbers: {},
  },
  "not-working": {
    level: "record",
    label: "Not working",
    words: "were logged with the machine lifted or switched off",
    on: true,
    fixed: "Passes are made of working records; change what the working column means to bring them back.",
    numbers: {},
  },
  "start-ramp": {
    level: "record",
    label: "Start of a pass",
    words: "lie at the start of a pass, where the machine is still settling: within either of the two numbers",
    on: false,
    fixed: null,
    numbers: { distanceM: metres("first", 5), timeS: seconds("or first", 2) },
  },
  "end-ramp": {
    level: "record",
    label: "End of a pass",
    words: "lie at the end of a pass, where the machine is being lifted: within either of the two numbers",
    on: false,
    fixed: null,
    numbers: { distanceM: metres("last", 5), timeS: seconds("or last", 2) },
  },
  turning: {
    level: "record",
    label: "Turning",
    words: "were logged in a turn",
    on: false,
    fixed: null,
    numbers: {
      turnDeg: { label: "more than", unit: "deg", standard: 45, minimum: 1, maximum: 180 },
      withinM: { label: "within", unit: "m", standard: 15, minimum: 2, maximum: 200 },
    },
  },
  speed: {
    level: "record",
    label: "Speed",
    words: "were logged too slow, too fast, or while speeding up or braking hard",
    on: false,
    fixed: null,
    numbers: {
      minMps: speed("slower than", 0.5),
      maxMps: speed("faster than", 6),
      maxAccelerationMps2: { label: "changing faster than", unit: "m/s2", standard: 1, minimum: 0.01, maximum: 100 },
    },
  },
  "sensor-stuck": {
    level: "reading",
    label: "Sensor stuck",
    words: "come from a row whose value did not change while the other rows' did",
    on: false,
    fixed: null,
    numbers: {
      unchangedRecords: {
        label: "for more records in a row than",
        unit: "1",
        standard: 20,
        minimum: 2,
        maximum: 10_000,
        whole: true,
      },
    },
  },
  "physical-range": {
    level: "reading",
    label: "Beyond what can be",
    words: "are smaller or larger than the channel can be",
    on: false,
    fixed: null,
    numbers: {
      downforceMinN: bound("downforce", "downforce under", { unit: "N", standard: -3000 }),
      downforceMaxN: bound("downforce", "downforce over", { unit: "N", standard: 8000 }),
      marginMinN: bound("margin", "margin under", { unit: "N", standard: -500 }),
      marginMaxN: bound("margin", "margin over", { unit: "N", standard: 6000 }),
      contactMinFraction: bound("contact", "contact under", { unit: "fraction", standard: 0 }),
      contactMaxFraction: bound("contact", "contact over", { unit: "fraction", standard: 1 }),
      depthMinM: bound("depth", "depth under", { unit: "m", standard: 0 }),
      depthMaxM: bound("depth", "depth over", { unit: "m", standard: 0.2 }),
      populationMinPerM2: bound("population", "population under", { unit: "1/m2", standard: 0 }),
      populationMaxPerM2: bound("population", "population over", { unit: "1/m2", standard: 1000 }),
      yieldFlowMinKgPerS: bound("yieldFlow", "grain flow under", { unit: "kg/s", standard: 0 }),
      yieldFlowMaxKgPerS: bound("yieldFlow", "grain flow over", { unit: "kg/s", standard: 60 }),
      moistureMinFraction: bound("moisture", "moisture under", { unit: "fraction", standard: 0.02 }),
      moistureMaxFraction: bound("moisture", "moisture over", { unit: "fraction", standard: 0.6 }),
    },
  },
  "local-outlier": {
    level: "reading",
    label: "Stands alone",
    words:
      "are far off both what the same row logged close by and what the other rows logged at that moment, measured in usual spreads",
    on: false,
    fixed: null,
    numbers: {
      maxSpreads: { label: "more usual spreads than", unit: "1", standard: 5, minimum: 2, maximum: 100 },
      withinM: metres("same row within", 10, 100),
    },
  },
  "short-pass": {
    level: "record",
    label: "Short pass",
    words: "belong to a pass shorter than either number",
    on: false,
    fixed: null,
    numbers: {
      minLengthM: metres("shorter than", 10, 1000),
      minRecords: { label: "fewer records than", unit: "1", standard: 10, minimum: 1, maximum: 10_000, whole: true },
    },
  },
  overlap: {
    level: "reading",
    label: "Ground worked before",
    words: "stand on ground that an earlier pass had already worked",
    on: false,
    fixed: null,
    numbers: {
      minShareFraction: { label: "more of it than", unit: "fraction", standard: 0.5, minimum: 0, maximum: 0.99 },
      minApartS: seconds("worked earlier by more than", 10),
    },
  },
} as const satisfies Record<string, RuleFacts>;

export type CleaningCode = keyof typeof CLEANING_RULES;

/** All codes in order; the number of a rule is its place here, from 1. */
export const CLEANING_CODES = Object.keys(CLEANING_RULES) as CleaningCode[];

export type CleaningRule<Code extends CleaningCode> = { on: boolean } & {
  [Name in keyof (typeof CLEANING_RULES)[Code]["numbers"]]: number;
};

/** What of each rule is chosen: on or off, and its numbers. */
export type CleaningRules = { [Code in CleaningCode]: CleaningRule<Code> };

/** Facts of a rule with its numbers under plain names. */
export function ruleFacts(code: CleaningCode): RuleFacts {
  return CLEANING_RULES[code];
}

/** Number of a rule as the derived channel `flags` carries it: 1 for the first. */
export function ruleNumber(code: CleaningCode): number {
  return CLEANING_CODES.indexOf(code) + 1;
}
