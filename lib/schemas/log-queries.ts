import { z } from "zod";
import { CleanedQuery } from "@/lib/schemas/cleaning";

/** Query parameters of what is read from a log. */
export const ChannelQuery = z.object({ channel: z.string().min(1).max(120) });

/** The same, and whether with the log's adjustments. */
export const CleanedChannelQuery = ChannelQuery.extend(CleanedQuery.shape);

/** How the readings of a pass come: a list a row, or packed into one text, a fifth of the work at both ends. */
export const ReadingsQuery = CleanedChannelQuery.extend({ values: z.enum(["lists", "packed"]).default("lists") });

const numberList = (text: string) => text.split(",").map((part) => (part.trim() === "" ? NaN : Number(part)));

/** `west,south,east,north` in degrees. */
export const BboxText = z
  .string()
  .transform(numberList)
  .refine((sides) => sides.length === 4 && sides.every(Number.isFinite), "needs west,south,east,north in degrees")
  .transform((sides) => sides as [number, number, number, number]);

export const ZonesQuery = CleanedChannelQuery.extend({
  breaks: z
    .string()
    .transform(numberList)
    .refine((edges) => edges.length <= 32 && edges.every(Number.isFinite), "needs up to 32 numbers, such as 300,600"),
  bbox: BboxText.optional(),
  minLengthM: z.coerce.number().min(0).max(10_000).optional(),
});

export const SwathsQuery = z.object({ bbox: BboxText.optional() });

export const PlaceQuery = CleanedQuery.extend({
  lon: z.coerce.number().min(-180).max(180),
  lat: z.coerce.number().min(-90).max(90),
});
