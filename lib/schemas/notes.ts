import { z } from "zod";
import { Position } from "@/lib/schemas/geometry";
import { Id, Instant, listOf } from "@/lib/schemas/listing";

/** A line longer than this was not drawn by hand. */
const MOST_POSITIONS = 2000;

/** Where a note belongs: a place, or a line on the ground. RFC 7946, WGS 84. */
export const NoteGeometry = z.discriminatedUnion("type", [
  z.object({ type: z.literal("Point"), coordinates: Position }),
  z.object({
    type: z.literal("LineString"),
    coordinates: z
      .array(Position)
      .min(2, "a line has at least 2 positions")
      .max(MOST_POSITIONS, `a note's line has at most ${MOST_POSITIONS} positions`)
      .refine(
        (line) => line.some((position) => String(position) !== String(line[0])),
        "a line has at least two different positions",
      ),
  }),
]);
export type NoteGeometry = z.infer<typeof NoteGeometry>;

/** Invisible characters that hide or turn text round; line breaks may stand in a note. */
const HIDDEN = /[^\P{Cc}\n\t]|[\u00ad\u200b\u200e\u200f\u2028-\u202e\u2060-\u2069\ufeff]/u;
const NoteText = z
  .string()
  .trim()
  .min(1, "a note says something")
  .max(2000)
  .refine((text) => !HIDDEN.test(text), "a note is visible text");

export const NoteInput = z.object({ text: NoteText, geometry: NoteGeometry });
export type NoteInput = z.infer<typeof NoteInput>;

export const NotePatch = NoteInput.partial();
export type NotePatch = z.infer<typeof NotePatch>;

export const Note = z.object({
  id: Id,
  fieldId: Id,
  text: z.string(),
  geometry: NoteGeometry,
  /** Along the line on the WGS 84 ellipsoid; null for a place. */
  lengthM: z.number().nullable(),
  /** Who wrote it; null when they are no longer here. */
  createdBy: z.object({ id: Id, name: z.string() }).nullable(),
  createdAt: Instant,
  updatedAt: Instant,
});
export type Note = z.infer<typeof Note>;
export const NoteList = listOf(Note);
