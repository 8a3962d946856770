import type { Adjustments } from "@/lib/adjustments/adjustments";
import type { CleaningCounts } from "@/lib/cleaning/count-rules";
import type { LeftOut } from "@/lib/cleaning/left-out";
import type { PackedPlacedLog } from "@/lib/logs/packed-placed-log";
import type { CleaningEffect } from "@/lib/schemas/cleaning";

/** What is asked about a log with adjustments. */
export interface CleaningTask {
  id: number;
  kind: "left-out" | "counts" | "answers";
  /** Version of the log; masks of the same version are worked out once. */
  logKey: string;
  /** All channels as logged, in shared memory. */
  packed: PackedPlacedLog;
  adjustments: Adjustments;
}

export interface CountedCleaning extends CleaningCounts {
  effect: CleaningEffect[];
}

export interface CleaningResults {
  "left-out": LeftOut | null;
  counts: CountedCleaning;
  /** As `log_results` keeps them: `rows:<channel>` and `verdict`. */
  answers: { kind: string; body: unknown }[];
}

export type CleaningReply =
  { id: number; ok: true; result: CleaningResults[CleaningTask["kind"]] } | { id: number; ok: false; message: string };
