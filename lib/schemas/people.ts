import { z } from "zod";
import { plainText } from "@/lib/schemas/plain-text";
import { ROLES } from "@/lib/access/permissions";
import { Id, Instant, listOf } from "@/lib/schemas/listing";

export const RoleName = z.enum(ROLES);
export const UnitSystem = z.enum(["metric", "imperial"]);

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
