import { z } from "zod";
import { NullableNumber } from "@/lib/schemas/listing";
import { MultiPolygonSchema, PolygonSchema } from "@/lib/schemas/geometry";

/** Stretches of one row in one class, RFC 7946. */
export const ZoneCollectionBody = z.object({
  type: z.literal("FeatureCollection"),
  features: z.array(
    z.object({
      type: z.literal("Feature"),
      /** Several parts only across the antimeridian. */
      geometry: z.union([PolygonSchema, MultiPolygonSchema]),
      properties: z.object({
        row: z.number().int(),
        pass: z.number().int(),
        class: z.number().int(),
        mean: NullableNumber,
        min: NullableNumber,
        max: NullableNumber,
        n: z.number().int(),
        areaM2: z.number(),
        startS: NullableNumber,
        endS: NullableNumber,
      }),
    }),
  ),
});

/** The ground of each pass, RFC 7946. */
export const SwathCollectionBody = z.object({
  type: z.literal("FeatureCollection"),
  features: z.array(
    z.object({
      type: z.literal("Feature"),
      geometry: z.union([PolygonSchema, MultiPolygonSchema]),
      properties: z.object({
        pass: z.number().int(),
        areaM2: z.number(),
        headingDeg: NullableNumber,
        lengthM: z.number(),
      }),
    }),
  ),
});
