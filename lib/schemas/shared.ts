import { z } from "zod";
import { PlaceGeometry } from "@/lib/schemas/geometry";
import { Instant, NullableNumber } from "@/lib/schemas/listing";
import { CoverageBody, LogChannelBody, VerdictBody } from "@/lib/schemas/logs";
import { ShareLayer } from "@/lib/schemas/shares";

/** What a share link shows: the shared layers and nothing else. Everything is null that was not shared. */
export const SharedView = z.object({
  audience: z.string(),
  layers: z.array(ShareLayer),
  expiresAt: Instant,
  organisationName: z.string(),
  fieldName: z.string(),
  /** Positions are moved to 0° N 0° E with their true shape and size: draw no background map, and there are no tiles. */
  blurLocation: z.boolean(),
  boundary: PlaceGeometry.nullable(),
  areaM2: NullableNumber,
  log: z
    .object({
      name: z.string(),
      kind: z.enum(["seeding", "harvest", "other"]),
      status: z.string(),
      startedAt: Instant.nullable(),
      endedAt: Instant.nullable(),
      rows: z.number().int(),
      passes: z.number().int(),
      version: z.number().int(),
      /** Null under `blurLocation`. */
      bbox: z.tuple([z.number(), z.number(), z.number(), z.number()]).nullable(),
      channels: z.array(LogChannelBody),
    })
    .nullable(),
  verdict: VerdictBody.nullable(),
  coverage: CoverageBody.nullable(),
});
export type SharedView = z.infer<typeof SharedView>;

export const SharePasscode = z.object({ passcode: z.string().min(1).max(64) });
