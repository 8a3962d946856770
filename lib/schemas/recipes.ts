import { z } from "zod";
import { Id, Instant, listOf } from "@/lib/schemas/listing";

/** A saved meaning of columns, offered to the next file with the same header. */
export const Recipe = z.object({
  id: Id,
  name: z.string(),
  mapping: z.unknown(),
  createdAt: Instant,
  usedAt: Instant.nullable(),
});
export type Recipe = z.infer<typeof Recipe>;
export const RecipeList = listOf(Recipe);
