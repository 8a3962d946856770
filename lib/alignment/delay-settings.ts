/** How a delay is looked for, and when it is refused. */
export const DELAY_SETTINGS = {
  /** Delays tried. */
  leastDelayS: -3,
  mostDelayS: 20,
  coarseStepS: 0.5,
  fineStepS: 0.25,
  /** How far about the coarse answer the fine search goes. */
  fineReachS: 3.5,
  /** Largest distance, either way, that may stand beside a delay. */
  mostDistanceM: 6,
  /** How far a pattern that lies askew may be displaced between the compared rows of two neighbours. */
  mostSkewM: 12,
  /** Neighbouring passes of opposite directions that must be compared (of each side, two). */
  leastPairs: 6,
  leastPairsOfASide: 2,
  /** Ground that two passes must have in common. */
  leastOverlapM: 40,
  /** Refused where the least J is above this share of the median J. */
  flatAbove: 0.9,
  /** Also where the dip of J is less than this many standard deviations of J's own unsteadiness from delay to delay. */
  leastDipSds: 5,
  /** Not asked of a dip as sharp as this: chance makes none, and on banded ground J itself swings from delay to delay. */
  surelyNoChance: 0.4,
  /** Refused where another dip, at least this far off, is nearly as deep. */
  otherDipFromS: 1.5,
  otherDipShare: 0.8,
  /**
   * Refused where opposite passes somewhere mirror each other (correlation below 0) by more than `share` of how far they
   * agree anywhere, less `less`, unless they agree better than `agreesAnyway`: such a channel answers changes of the ground
   * (a margin that a controller holds), so it turns its sign with the direction of travel and J has its least beside the
   * true delay. Numbers set on simulated fields of both kinds.
   */
  mirror: { share: 0.8, less: 0.15 },
  agreesAnyway: 0.85,
  /** Refused where the 95 % interval is wider than this. */
  widestIntervalS: 1,
  /** Speeds (p95 - p05, as a share of their median) from which a delay can be told from a distance. */
  leastSpeedSpread: 0.2,
  /** Readings further than this many robust standard deviations from the rest of their pass are left out. */
  outlierSds: 5,
  /** Left out at both ends of a pass, beyond the delay itself: rows go in and come out there. */
  endS: 1,
  /** A delay counts only where this share of the ground compared at the best-covered delay remains. */
  leastGroundShare: 0.4,
  /** A skewed pattern is allowed for only where it lowers J by this share. */
  skewGain: 0.1,
  resamples: 400,
  /** Records compared at most; whole passes beyond that are left out, evenly. */
  mostRecords: 30_000,
} as const;
