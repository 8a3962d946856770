import { z } from "zod";

const Known = z.number().nullable();
/** 95 %, with passes as the units that repeat; null where there are too few. */
const Interval = z.tuple([z.number(), z.number()]).nullable();

export const PassStatisticsItem = z.object({
  pass: z.number().int(),
  headingDeg: Known,
  headland: z.boolean(),
  lengthM: z.number(),
  records: z.number().int(),
  startedAt: z.string().nullable(),
  speedMps: Known,
  n: z.number().int(),
  /** Distance with readings, the mean over rows. */
  distanceM: z.number(),
  mean: Known,
  sd: Known,
  p05: Known,
  p25: Known,
  p50: Known,
  p75: Known,
  p95: Known,
  shareUnderTarget: Known,
  shareAtLimit: Known,
  shareContactLost: Known,
});
export type PassStatisticsItem = z.infer<typeof PassStatisticsItem>;

export const PassGroup = z.object({
  /**
   * `along`, `against`: the two ways along the main direction. `inside`, `headland`. `slow`, `middle`, `fast`: thirds of the
   * distance by speed. `straight`, `inner`, `between`, `outer`: going straight, and thirds of the rows in a turn.
   */
  key: z.string(),
  passes: z.number().int(),
  /** Distance with readings, the mean over rows. */
  distanceM: z.number(),
  mean: Known,
  interval: Interval,
  speedMps: Known,
  /** Of `along` and `against`. */
  headingDeg: Known.optional(),
  /** Of thirds by speed: from the first to the second. */
  speedBetweenMps: z.tuple([z.number(), z.number()]).optional(),
  /** Of rows in a turn: less what the same rows read going straight. */
  fromStraight: Known.optional(),
  fromStraightInterval: Interval.optional(),
});
export type PassGroup = z.infer<typeof PassGroup>;

export const PassComparison = z.object({
  by: z.enum(["direction", "place", "speed", "turn"]),
  groups: z.array(PassGroup),
  /** First group's mean less the second's. */
  difference: z.object({ first: z.string(), second: z.string(), value: z.number(), interval: Interval }).nullable(),
  /** Why there is no comparison or no interval. */
  reason: z.string().nullable(),
});
export type PassComparison = z.infer<typeof PassComparison>;

/** Body of `GET /logs/{logId}/pass-statistics`. */
export const PassStatisticsBody = z.object({
  channel: z.string(),
  unit: z.string(),
  items: z.array(PassStatisticsItem),
  comparisons: z.array(PassComparison),
});
export type PassStatisticsBody = z.infer<typeof PassStatisticsBody>;

/** One metre from the start of the passes, or before their end. */
export const RampMetre = z.object({
  fromM: z.number(),
  passes: z.number().int(),
  mean: Known,
  /** Mean over passes of the reading less the middle of the same pass. */
  difference: Known,
  interval: Interval,
  speedMps: Known,
});
export type RampMetre = z.infer<typeof RampMetre>;

const RampEnd = z.object({
  metres: z.array(RampMetre),
  /** From here on the interval holds 0 for three metres running; null where it never does, or without intervals. */
  settledAtM: Known,
});
export type RampEnd = z.infer<typeof RampEnd>;

/** Body of `GET /logs/{logId}/ramps`. */
export const RampsBody = z.object({
  channel: z.string(),
  unit: z.string(),
  /** How far from either end is shown. The middle of a pass lies further from both. */
  reachM: z.number(),
  /** Passes long enough to have a middle. */
  passes: z.number().int(),
  tooShort: z.number().int(),
  middleMean: Known,
  start: RampEnd,
  end: RampEnd,
  reason: z.string().nullable(),
});
export type RampsBody = z.infer<typeof RampsBody>;
