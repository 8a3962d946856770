import { z } from "zod";

export const Position = z
  .array(z.number().finite())
  .min(2)
  .max(4)
  .refine(
    ([longitude, latitude]) => Math.abs(longitude ?? 999) <= 180 && Math.abs(latitude ?? 999) <= 90,
    "a position is [longitude, latitude] in degrees, longitude within 180 and latitude within 90",
  );
const Ring = z
  .array(Position)
  .min(4, "a ring has at least 4 positions, the last equal to the first")
  .refine((ring) => String(ring[0]) === String(ring.at(-1)), "a ring is closed: its last position equals its first");

export const LonLat = z.tuple([z.number().min(-180).max(180), z.number().min(-90).max(90)]);
export const PolygonSchema = z.object({ type: z.literal("Polygon"), coordinates: z.array(Ring).min(1) });
export const MultiPolygonSchema = z.object({
  type: z.literal("MultiPolygon"),
  coordinates: z.array(z.array(Ring).min(1)).min(1),
});

/** A field boundary, RFC 7946, WGS 84. */
export const Boundary = z.discriminatedUnion("type", [PolygonSchema, MultiPolygonSchema]);
export type Boundary = z.infer<typeof Boundary>;

/** Any GeoJSON geometry that a finding may point at. */
export const PlaceGeometry = z.looseObject({ type: z.string() });
