import { z } from "zod";
import { CLEANING_CODES, CLEANING_RULES, type CleaningCode, type RuleNumber } from "@/lib/cleaning/rule-catalogue";
import { Instant, NullableNumber } from "@/lib/schemas/listing";
import { plainText } from "@/lib/schemas/plain-text";

type RuleShape<Code extends CleaningCode> = z.ZodObject<
  { on: z.ZodBoolean } & Record<keyof (typeof CLEANING_RULES)[Code]["numbers"], z.ZodNumber>
>;

function numberSchema({ minimum, maximum, whole }: RuleNumber): z.ZodNumber {
  const number = whole ? z.number().int() : z.number();
  return number.min(minimum).max(maximum);
}

/** The shape of a rule as the catalogue has it: `{on, …its numbers}`. */
function ruleSchema<Code extends CleaningCode>(code: Code): RuleShape<Code> {
  const numbers = Object.entries<RuleNumber>(CLEANING_RULES[code].numbers).map(
    ([name, facts]) => [name, numberSchema(facts)] as const,
  );
  // The names come from the very catalogue entry that the type reads.
  return z.strictObject({ on: z.boolean(), ...Object.fromEntries(numbers) }) as unknown as RuleShape<Code>;
}

/** Every rule with its switch and numbers, in order. */
export const CleaningRulesBody = z.strictObject({
  "no-position": ruleSchema("no-position"),
  "duplicate-time": ruleSchema("duplicate-time"),
  "impossible-step": ruleSchema("impossible-step"),
  "not-working": ruleSchema("not-working"),
  "start-ramp": ruleSchema("start-ramp"),
  "end-ramp": ruleSchema("end-ramp"),
  turning: ruleSchema("turning"),
  speed: ruleSchema("speed"),
  "sensor-stuck": ruleSchema("sensor-stuck"),
  "physical-range": ruleSchema("physical-range"),
  "local-outlier": ruleSchema("local-outlier"),
  "short-pass": ruleSchema("short-pass"),
  overlap: ruleSchema("overlap"),
});

/** Rules to change: those not named, and numbers not given, stay as they are. */
export const CleaningRulesChange = z.strictObject({
  "no-position": ruleSchema("no-position").partial().optional(),
  "duplicate-time": ruleSchema("duplicate-time").partial().optional(),
  "impossible-step": ruleSchema("impossible-step").partial().optional(),
  "not-working": ruleSchema("not-working").partial().optional(),
  "start-ramp": ruleSchema("start-ramp").partial().optional(),
  "end-ramp": ruleSchema("end-ramp").partial().optional(),
  turning: ruleSchema("turning").partial().optional(),
  speed: ruleSchema("speed").partial().optional(),
  "sensor-stuck": ruleSchema("sensor-stuck").partial().optional(),
  "physical-range": ruleSchema("physical-range").partial().optional(),
  "local-outlier": ruleSchema("local-outlier").partial().optional(),
  "short-pass": ruleSchema("short-pass").partial().optional(),
  overlap: ruleSchema("overlap").partial().optional(),
});
export type CleaningRulesChange = z.infer<typeof CleaningRulesChange>;

export const CleaningChange = z.object({ rules: CleaningRulesChange, note: plainText(200).optional() });
export const CleaningPreviewBody = z.object({ rules: CleaningRulesChange });
/** Without `revert`: the revision before the one in force. */
export const CleaningUndo = z.object({
  revert: z.number().int().min(0).max(2_147_483_647).optional(),
  note: plainText(200).optional(),
});

const Count = z.number().int();
const ReadingCount = z.object({ readings: Count });

/** A number of a rule, for screens. */
export const RuleParameter = z.object({
  name: z.string(),
  label: z.string(),
  /** SI; `m/s2` for accelerations. */
  unit: z.string(),
  value: z.number(),
  standard: z.number(),
  minimum: z.number(),
  maximum: z.number(),
  whole: z.boolean(),
  /** The channel whose readings it bounds. */
  channel: z.string().nullable(),
});
export type RuleParameter = z.infer<typeof RuleParameter>;

export const CleaningItem = z.object({
  code: z.enum(CLEANING_CODES),
  /** As the channel `flags` carries it. */
  number: Count,
  label: z.string(),
  /** The end of "leaves out readings that …". */
  words: z.string(),
  on: z.boolean(),
  /** Why it cannot be switched off; null where it can. */
  fixed: z.string().nullable(),
  parameters: z.array(RuleParameter),
  level: z.enum(["record", "reading"]),
  /** Records of which it takes something out, on or off. */
  records: Count,
  /** Readings that it takes out, or would, whatever the other rules do. */
  readings: Count,
  /** `readings` as a share of the readings in passes; for rules that cannot be switched off, of all readings. */
  share: z.number(),
  /** Readings that no rule before it (of those that are on) had taken out. */
  takenOutFirst: Count,
  /** Readings left when its turn comes, and after it; the same where it is off. */
  before: ReadingCount,
  after: ReadingCount,
});
export type CleaningItem = z.infer<typeof CleaningItem>;

/** Of all readings in passes, each weighted by the distance its row travelled. */
export const ChannelSummary = z.object({
  n: Count,
  mean: NullableNumber,
  sd: NullableNumber,
  p05: NullableNumber,
  p50: NullableNumber,
  p95: NullableNumber,
  /** Margin only, where the machine has a target. */
  shareUnderTarget: NullableNumber,
});
export type ChannelSummary = z.infer<typeof ChannelSummary>;
export const CleaningEffect = z.object({
  channel: z.string(),
  unit: z.string(),
  asLogged: ChannelSummary,
  cleaned: ChannelSummary,
});
export type CleaningEffect = z.infer<typeof CleaningEffect>;

export const AdjustmentRevision = z.object({
  revision: Count,
  at: Instant,
  /** Name of who made it. */
  by: z.string().nullable(),
  note: z.string().nullable(),
  /** The earlier revision that it went back to. */
  revertedTo: Count.nullable(),
});
export type AdjustmentRevision = z.infer<typeof AdjustmentRevision>;

const counted = {
  rules: CleaningRulesBody,
  items: z.array(CleaningItem),
  effect: z.array(CleaningEffect),
  /** All readings of the file, those in passes, and those that the rules keep. */
  total: z.object({ logged: Count, before: Count, after: Count }),
};

/** What rules would do, without keeping them. */
export const CleaningPreview = z.object(counted);
export type CleaningPreview = z.infer<typeof CleaningPreview>;

export const Cleaning = z.object({
  /** 0: as read. */
  revision: Count,
  ...counted,
  /** Delay of each channel in force, seconds. */
  delaysS: z.record(z.string(), z.number()),
  /** The newest first. */
  history: z.array(AdjustmentRevision),
});
export type Cleaning = z.infer<typeof Cleaning>;

/** `?cleaned=false` reads the log as it was logged: no rule, no delay. */
export const CleanedQuery = z.object({
  cleaned: z
    .enum(["true", "false", "1", "0"])
    .default("true")
    .transform((text) => text === "true" || text === "1")
    .describe("false: as it was logged, without cleaning rules and delays"),
});
