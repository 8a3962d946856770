import { z } from "zod";

/** Query parameters of every list. */
export const ListQuery = z.object({
  limit: z.coerce.number().int().min(1).max(500).default(100),
  cursor: z.string().max(200).optional(),
});
export type ListQuery = z.infer<typeof ListQuery>;

/** `?force=1` on a deletion: also what hangs on it. */
export const ForceQuery = z.object({
  force: z
    .enum(["0", "1"])
    .default("0")
    .transform((text) => text === "1"),
});

/** `{items, nextCursor}`. */
export function listOf<Item extends z.ZodType>(item: Item) {
  return z.object({ items: z.array(item), nextCursor: z.string().nullable() });
}

export const Id = z.string().min(1).max(64);
export const Instant = z.iso.datetime();
export const NullableNumber = z.number().nullable();
