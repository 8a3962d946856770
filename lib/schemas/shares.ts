import { z } from "zod";
import { Id, Instant, listOf } from "@/lib/schemas/listing";

export const SHARE_LAYERS = ["boundary", "downforce", "margin", "depth", "resistance", "verdict", "coverage"] as const;
export const ShareLayer = z.enum(SHARE_LAYERS);

export const ShareInput = z.object({
  audience: z.enum(["landowner", "adviser", "operator", "public"]),
  layers: z.array(ShareLayer).min(1, "choose at least one layer"),
  logId: Id.optional(),
  expiresAt: Instant,
  passcode: z.string().min(4).max(64).optional(),
  allowDownload: z.boolean().default(false),
  blurLocation: z.boolean().default(false),
  emailTo: z.email().optional(),
});
export type ShareInput = z.infer<typeof ShareInput>;

export const Share = z.object({
  id: Id,
  fieldId: Id,
  logId: Id.nullable(),
  audience: z.string(),
  layers: z.array(z.string()),
  expiresAt: Instant,
  revokedAt: Instant.nullable(),
  hasPasscode: z.boolean(),
  allowDownload: z.boolean(),
  blurLocation: z.boolean(),
  createdAt: Instant,
  openedCount: z.number().int(),
  lastOpenedAt: Instant.nullable(),
  state: z.enum(["open", "expired", "revoked"]),
});
export type Share = z.infer<typeof Share>;
export const ShareList = listOf(Share);
/** The address holds the token and appears only in this reply. */
export const ShareCreated = Share.extend({
  url: z.string(),
  /** Whether the link was mailed; null when no address was given. */
  emailed: z.boolean().nullable(),
});
export type ShareCreated = z.infer<typeof ShareCreated>;
