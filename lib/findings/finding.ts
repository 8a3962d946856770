import { z } from "zod";

/** GeoJSON geometry that a finding points at, WGS 84. */
export const FindingPlace = z.discriminatedUnion("type", [
  z.object({ type: z.literal("LineString"), coordinates: z.array(z.tuple([z.number(), z.number()])).min(2) }),
  z.object({
    type: z.literal("MultiLineString"),
    coordinates: z.array(z.array(z.tuple([z.number(), z.number()])).min(2)).min(1),
  }),
]);
export type FindingPlace = z.infer<typeof FindingPlace>;

export const FINDING_KINDS = [
  "readings-doubtful",
  "row-stands-out",
  "rows-side-by-side",
  "rows-some-passes",
  "wheel-tracks",
  "rows-under-target",
  "rows-at-limit",
  "contact-lost",
  "over-target",
  "weight-short",
  "weight-enough",
  "weight-unknown",
  "target-held",
  "rows-alike",
  "cannot-judge",
  "not-a-seeding-log",
] as const;
export type FindingKind = (typeof FINDING_KINDS)[number];

export const SEVERITIES = ["ok", "look", "act"] as const;

/** A number that a sentence speaks of, SI. */
export const FindingValue = z.object({ value: z.number(), unit: z.string() });

/** One statement in words, with the number, the place and the method that carry it. */
export const Finding = z.object({
  id: z.string(),
  kind: z.enum(FINDING_KINDS),
  severity: z.enum(SEVERITIES),
  /** In SI units. */
  sentence: z.string(),
  /** The same with `{name}` where a number of `values` stands, so that a screen can say it in the reader's units. */
  sentenceTemplate: z.string(),
  values: z.record(z.string(), FindingValue),
  value: z.number().nullable(),
  unit: z.string(),
  /** 95 % interval of `value`; null where there are too few passes for one. */
  interval: z.tuple([z.number(), z.number()]).nullable(),
  confidence: z.enum(["high", "medium", "low"]),
  method: z.string(),
  place: FindingPlace.nullable(),
  check: z.string(),
  caution: z.string().nullable(),
  /** The row it speaks of, from 1; null where it is about several or the whole machine. */
  row: z.number().int().nullable(),
  rows: z.array(z.number().int()),
});
export type Finding = z.infer<typeof Finding>;
