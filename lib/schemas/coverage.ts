import { z } from "zod";
import { MultiPolygonSchema, PolygonSchema } from "@/lib/schemas/geometry";

/**
 * Why ground was worked twice. `headland`: a headland pass met another pass squarely or alongside. `point-row`: passes that
 * meet at an angle. `guess-row`: neighbouring passes side by side, closer than the machine is wide. `other`: all else, the same
 * line driven again and a pass that crosses itself included.
 */
export const OVERLAP_CAUSES = ["headland", "point-row", "guess-row", "other"] as const;
export const OverlapCause = z.enum(OVERLAP_CAUSES);
export type OverlapCause = z.infer<typeof OverlapCause>;

export const OverlapByCause = z.object({ cause: OverlapCause, areaM2: z.number() });
export type OverlapByCause = z.infer<typeof OverlapByCause>;

/** A piece of ground worked twice, or left out between worked ground. */
export const CoverageArea = z.object({
  type: z.literal("Feature"),
  geometry: z.discriminatedUnion("type", [PolygonSchema, MultiPolygonSchema]),
  properties: z.object({
    kind: z.enum(["overlap", "skip"]),
    /** Null for a skip. */
    cause: OverlapCause.nullable(),
    /** Passes that worked the ground twice, or that lie along a skip. */
    passes: z.array(z.number().int()),
    areaM2: z.number(),
    /** Longest extent along the passes. */
    lengthM: z.number(),
  }),
});
export type CoverageArea = z.infer<typeof CoverageArea>;

/** Body of `GET /logs/{logId}/coverage/areas`, the largest first. */
export const CoverageAreas = z.object({ type: z.literal("FeatureCollection"), features: z.array(CoverageArea) });
export type CoverageAreas = z.infer<typeof CoverageAreas>;
