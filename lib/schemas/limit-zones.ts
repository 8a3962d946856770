import { z } from "zod";
import { CleanedQuery } from "@/lib/schemas/cleaning";
import { MultiPolygonSchema, PolygonSchema } from "@/lib/schemas/geometry";
import { BboxText } from "@/lib/schemas/log-queries";

export const LIMIT_ZONE_KINDS = ["under-target", "at-limit", "over-target", "too-shallow"] as const;
export type LimitZoneKind = (typeof LIMIT_ZONE_KINDS)[number];

/** Query of `GET /logs/{logId}/zones` for stretches past a limit, instead of classes of a channel. */
export const LimitZonesQuery = CleanedQuery.extend({
  kind: z.enum(LIMIT_ZONE_KINDS).describe("stretches past a limit, instead of channel and breaks"),
  depthM: z.coerce
    .number()
    .min(0)
    .max(1)
    .optional()
    .describe("too-shallow: the depth below which; 6 mm less than the log's median where left out"),
  bbox: BboxText.optional(),
  minLengthM: z.coerce.number().min(0).max(10_000).optional(),
});

const Known = z.number().nullable();

export const LimitZone = z.object({
  type: z.literal("Feature"),
  geometry: z.union([PolygonSchema, MultiPolygonSchema]),
  properties: z.object({
    row: z.number().int(),
    pass: z.number().int(),
    /** Number of the patch that it is part of. */
    patch: z.number().int(),
    lengthM: z.number(),
    areaM2: z.number(),
    /** Of the ground that all rows worked. */
    shareOfWorked: Known,
    /** Of the channel, from the raw readings. */
    mean: Known,
    min: Known,
    max: Known,
    n: z.number().int(),
    startS: Known,
    endS: Known,
  }),
});
export type LimitZone = z.infer<typeof LimitZone>;

/** Zones of neighbouring rows in one pass that touch, as people speak of them: "rows 5 to 9, 42 m". */
export const ZonePatch = z.object({
  patch: z.number().int(),
  pass: z.number().int(),
  firstRow: z.number().int(),
  lastRow: z.number().int(),
  /** Along the pass, from where its first cell begins. */
  fromM: z.number(),
  toM: z.number(),
  /** From the first to the last of it, along the pass. */
  lengthM: z.number(),
  areaM2: z.number(),
  shareOfWorked: Known,
  mean: Known,
  zones: z.number().int(),
  /** West, south, east, north; west > east across the antimeridian. */
  bbox: z.tuple([z.number(), z.number(), z.number(), z.number()]),
});
export type ZonePatch = z.infer<typeof ZonePatch>;

/** Body of `GET /logs/{logId}/zones?kind=`: RFC 7946 with foreign members. */
export const LimitZonesBody = z.object({
  type: z.literal("FeatureCollection"),
  kind: z.enum(LIMIT_ZONE_KINDS),
  channel: z.string(),
  unit: z.string(),
  /** Readings below (under target, too shallow), above (over target) or from here on (at limit) count; SI. */
  threshold: z.number(),
  minLengthM: z.number(),
  features: z.array(LimitZone),
  patches: z.array(ZonePatch),
  totals: z.object({
    zones: z.number().int(),
    /** Row metres in zones. */
    lengthM: z.number(),
    areaM2: z.number(),
    /** Ground that all rows worked with readings of the channel. */
    workedM2: z.number(),
    shareOfWorked: Known,
    /** Share of the distance past the limit, reading by reading, also in stretches too short for a zone. */
    shareOfDistance: Known,
  }),
});
export type LimitZonesBody = z.infer<typeof LimitZonesBody>;
