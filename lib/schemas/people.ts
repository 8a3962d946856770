import { z } from "zod";
import { plainText } from "@/lib/schemas/plain-text";
import { ROLES } from "@/lib/access/permissions";
import { OWN_UNITS } from "@/lib/units/display-unit";
import { Id, Instant, listOf } from "@/lib/schemas/listing";

export const RoleName = z.enum(ROLES);
export const UnitSystem = z.enum(["metric", "imperial"]);
/** Units chosen one by one; what is null or left out is shown as the system has it. */
export const UnitPreferences = z.object({
  force: z.enum(OWN_UNITS.force).nullish(),
  depth: z.enum(OWN_UNITS.depth).nullish(),
  area: z.enum(OWN_UNITS.area).nullish(),
  speed: z.enum(OWN_UNITS.speed).nullish(),
});
/** "more": stronger lines and darker words on every screen, whatever the device asks for. */
export const Contrast = z.enum(["device", "more"]);

export const Member = z.object({
  id: Id,
  userId: Id,
  name: z.string(),
  email: z.string(),
  role: RoleName,
  fieldIds: z.array(Id),
  createdAt: Instant,
});
export type Member = z.infer<typeof Member>;
export const MemberList = listOf(Member);

export const MemberInput = z.object({
  email: z.email(),
  name: plainText(120).min(1),
  role: RoleName,
  /** First password; the person changes it in settings. */
  password: z.string().min(12, "a password has at least 12 characters").max(200),
});
export const MemberPatch = z.object({ role: RoleName.optional(), fieldIds: z.array(Id).optional() });

export const TokenInput = z.object({
  name: plainText(120).min(1),
  role: RoleName.optional(),
  expiresAt: Instant.optional(),
});
export const Token = z.object({
  id: Id,
  name: z.string(),
  role: RoleName,
  createdAt: Instant,
  expiresAt: Instant.nullable(),
  lastUsedAt: Instant.nullable(),
});
export const TokenList = listOf(Token);
/** `token` is shown once. */
export const TokenCreated = Token.extend({ token: z.string() });

export const AuditEntry = z.object({
  id: Id,
  at: Instant,
  userId: Id.nullable(),
  userName: z.string().nullable(),
  action: z.string(),
  subject: z.string(),
  detail: z.record(z.string(), z.unknown()),
});
export const AuditList = listOf(AuditEntry);
