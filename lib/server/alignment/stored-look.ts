import { z } from "zod";
import { ChannelDelay } from "@/lib/schemas/alignment";

/** How far the closer look at a version of a log is; kept as its result `look`. */
export const Look = z.object({
  state: z.enum(["waiting", "working", "done", "failed"]),
  attempts: z.number().int(),
  progress: z.number().min(0).max(1),
  /** Channels whose delay is wanted. */
  channels: z.array(z.string()),
});
export type Look = z.infer<typeof Look>;

/** What was found of one channel, on the log as it was read; kept as `delay:<channel>`. */
export const StoredDelay = ChannelDelay.omit({ applied: true });
export type StoredDelay = z.infer<typeof StoredDelay>;

/** What was found about left and right; kept as `mirrored`. */
export const StoredMirror = z.object({
  state: z.enum(["mirrored", "as-logged", "cannot-tell"]),
  evidence: z.object({ runs: z.number(), agreeing: z.number(), opposing: z.number() }),
  reason: z.string(),
});
export type StoredMirror = z.infer<typeof StoredMirror>;

export const LOOK = "look";
export const MIRRORED = "mirrored";
export const delayKind = (channel: string) => `delay:${channel}`;
