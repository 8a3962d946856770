import { z } from "zod";
import { NullableNumber } from "@/lib/schemas/listing";

/** `[from, to]` of a 95 % interval. */
const Interval = z.tuple([z.number(), z.number()]);

/** Why no delay can be told; `reason` of the item says it in words. */
export const DELAY_REFUSALS = [
  "no-times",
  "few-pairs",
  "one-sided-pairs",
  "nothing-varies",
  "flat",
  "at-the-edge",
  "mirrored",
  "two-answers",
  "too-wide",
] as const;
export type DelayRefusal = (typeof DELAY_REFUSALS)[number];

/**
 * How late one channel was written down. A positive delay: a reading belongs to the ground the rows were on so many seconds
 * before. A positive distance: it belongs that far behind where the machine's measures put the rows.
 */
export const ChannelDelay = z.object({
  channel: z.string(),
  unit: z.string(),
  state: z.enum(["estimated", "refused", "working"]),
  /** In words, where it was refused. */
  reason: z.string().optional(),
  reasonCode: z.enum(DELAY_REFUSALS).optional(),
  /** Where `separable` is false: the delay that explains the whole shift if none of it is distance. */
  delayS: NullableNumber,
  delayIntervalS: Interval.nullable(),
  /** Null where `separable` is false. */
  distanceM: NullableNumber,
  distanceIntervalM: Interval.nullable(),
  /** The whole shift at the usual speed: distance plus speed times delay. */
  shiftM: NullableNumber,
  shiftIntervalM: Interval.nullable(),
  /** Whether speeds differed enough to tell a delay from a distance. */
  separable: z.boolean(),
  usualSpeedMps: NullableNumber,
  /** Neighbouring passes driven in opposite directions that were compared. */
  pairs: z.number().int(),
  /** 1 - least J / median J: 0 where nothing tells one delay from another, up to 1. */
  sharpness: NullableNumber,
  /** Mean squared difference between the passes of a pair (unit of the channel, squared) at each delay tried. */
  curve: z.array(z.object({ delayS: z.number(), j: z.number() })),
  method: z.string(),
  /** The delay that the log's adjustments take out at present; null for none. */
  applied: NullableNumber,
});
export type ChannelDelay = z.infer<typeof ChannelDelay>;

export const DelaysBody = z.object({
  /** `none`: nobody has asked yet. `working`: a job is under way. `failed`: it was given up; asking again starts anew. */
  state: z.enum(["none", "working", "done", "failed"]),
  /** 0..1 of the job under way. */
  progress: z.number().min(0).max(1),
  /** Channels whose delay can be asked for. */
  channels: z.array(z.string()),
  items: z.array(ChannelDelay),
});
export type DelaysBody = z.infer<typeof DelaysBody>;

/** Without a channel: all of them. */
export const DelaysAsked = z.object({ channel: z.string().min(1).max(120).optional() });

/** Largest delay that may be taken out, either way. */
export const MAX_DELAY_S = 60;

/** Replaces the delays of the named channels; 0 takes none out. Channels left out keep theirs. */
export const DelaysChange = z.object({
  delaysS: z.record(z.string().min(1).max(120), z.number().min(-MAX_DELAY_S).max(MAX_DELAY_S)),
  note: z.string().max(500).optional(),
});
export type DelaysChange = z.infer<typeof DelaysChange>;
