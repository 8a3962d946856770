import { z } from "zod";
import { areClassEdges } from "@/lib/legend/class-edges";
import { categoriesOf } from "@/lib/legend/categories";
import { isChannelId } from "@/lib/logs/channel";
import { Instant } from "@/lib/schemas/listing";

/** More classes than this no legend has room for. */
const MOST_EDGES = 24;

/** Class edges of a channel; null edges: the organisation has no legend of its own for it any more. */
export const LegendInput = z.object({
  channel: z
    .string()
    .max(120)
    .refine(isChannelId, "is not the name of a channel")
    .refine((channel) => categoriesOf(channel) === null, "holds names, whose classes are fixed"),
  /** SI unit of the edges, as `unit` of the channel. */
  unit: z.string().min(1).max(12),
  edges: z.array(z.number()).max(MOST_EDGES).refine(areClassEdges, "needs rising numbers, at least one").nullable(),
});
export type LegendInput = z.infer<typeof LegendInput>;

export const Legend = z.object({
  channel: z.string(),
  unit: z.string(),
  /** Inner edges, rising; an edge belongs to the class above. */
  edges: z.array(z.number()),
  savedBy: z.object({ name: z.string() }).nullable(),
  savedAt: Instant,
});
export type Legend = z.infer<typeof Legend>;

export const LegendList = z.object({
  items: z.array(Legend),
  nextCursor: z.null(),
  /** Whether whoever asks may change them. */
  changeable: z.boolean(),
});
export type LegendList = z.infer<typeof LegendList>;
