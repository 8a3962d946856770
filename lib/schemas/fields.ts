import { z } from "zod";
import { Boundary } from "@/lib/schemas/geometry";
import { Id, Instant, listOf } from "@/lib/schemas/listing";
import { LogStatus } from "@/lib/schemas/logs";
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

/** The log that speaks for a field: the newest seeding log that was read, else the newest that was read, else the newest. */
export const NewestLog = z.object({
  id: Id,
  name: z.string(),
  kind: z.enum(["seeding", "harvest", "other"]),
  status: LogStatus,
  /** Its readings lie outside the field's boundary. */
  isElsewhere: z.boolean(),
  /** The gravest finding of its verdict; null where there is none, or it is not worked out yet. */
  severity: z.enum(["ok", "look", "act"]).nullable(),
});
export type NewestLog = z.infer<typeof NewestLog>;

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
  newestLog: NewestLog.nullable(),
  /** Logs that wait for a person: not mapped yet, or not readable. */
  waitingLogs: z.number().int(),
  createdAt: Instant,
  updatedAt: Instant,
});
export type Field = z.infer<typeof Field>;
export const FieldList = listOf(Field);
/** With what was done to the boundary that was sent: ends joined, ground in two parts counted once. */
export const FieldWithNotes = Field.extend({ notes: z.array(z.string()) });
