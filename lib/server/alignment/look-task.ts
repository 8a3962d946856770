import type { PackedPlacedLog } from "@/lib/logs/packed-placed-log";
import type { Boundary } from "@/lib/schemas/geometry";
import type { StoredDelay, StoredMirror } from "@/lib/server/alignment/stored-look";

/** What a looking thread is asked, one thing at a time. */
export type LookTask =
  | { kind: "delay"; packed: PackedPlacedLog; channel: string }
  | { kind: "mirrored"; packed: PackedPlacedLog; boundary: Boundary | null };

export interface LookResults {
  delay: StoredDelay;
  mirrored: StoredMirror;
}

export type LookReply = { ok: true; result: LookResults[LookTask["kind"]] } | { ok: false; message: string };
