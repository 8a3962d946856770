import { z } from "zod";
import { plainText } from "@/lib/schemas/plain-text";
import { Id } from "@/lib/schemas/listing";
import { Contrast, RoleName, UnitPreferences, UnitSystem } from "@/lib/schemas/people";

const OrganisationOfPerson = z.object({ id: Id, slug: z.string(), name: z.string(), role: RoleName });

/** The person asking and what they belong to; `organisation` is the one this request acts in. */
export const Me = z.object({
  id: Id,
  email: z.string(),
  name: z.string(),
  unitSystem: UnitSystem,
  unitPreferences: UnitPreferences.required(),
  contrast: Contrast,
  organisation: OrganisationOfPerson,
  organisations: z.array(OrganisationOfPerson),
});
export type Me = z.infer<typeof Me>;

export const NewPassword = z.string().min(12, "a password has at least 12 characters").max(200);

/** `newPassword` needs `currentPassword`, and ends every other session of the person. */
export const MePatch = z
  .object({
    name: plainText(120).min(1).optional(),
    unitSystem: UnitSystem.optional(),
    /** Those named change; the others stay. */
    unitPreferences: UnitPreferences.optional(),
    contrast: Contrast.optional(),
    currentPassword: z.string().max(200).optional(),
    newPassword: NewPassword.optional(),
  })
  .refine((patch) => patch.newPassword === undefined || patch.currentPassword !== undefined, {
    path: ["currentPassword"],
    message: "a new password needs the current one",
  });
export type MePatch = z.infer<typeof MePatch>;
