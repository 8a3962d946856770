import { z } from "zod";
import { Boundary } from "@/lib/schemas/geometry";
import { Id, Instant, listOf } from "@/lib/schemas/listing";
import { plainText } from "@/lib/schemas/plain-text";

const shortText = plainText(120);

export const FieldInput = z.object({
  name: shortText.min(1, "a field needs a name"),
  farm: shortText.nullish(),
  landowner: shortText.nullish(),
  boundary: Boundary.nullish(),
});
export type FieldInput = z.infer<typeof FieldInput>;

export const FieldPatch = FieldInput.partial();
export type FieldPatch = z.infer<typeof FieldPatch>;

export const Field = z.object({
  id: Id,
  name: z.string(),
  farm: z.string().nullable(),
  landowner: z.string().nullable(),
  /** On the WGS 84 ellipsoid; null without a boundary. */
  areaM2: z.number().nullable(),
  boundary: Boundary.nullable(),
  logCount: z.number().int(),
  lastLogAt: Instant.nullable(),
  createdAt: Instant,
  updatedAt: Instant,
});
export type Field = z.infer<typeof Field>;
export const FieldList = listOf(Field);
