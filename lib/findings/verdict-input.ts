import type { FrameBalance } from "@/lib/ballast/frame-balance";
import type { ChannelEvidence } from "@/lib/findings/row-evidence";
import type { PlacedLog } from "@/lib/logs/placed-log";

/** What every finding is made from. */
export interface VerdictInput {
  placed: PlacedLog;
  distances: Float32Array;
  margin: ChannelEvidence | null;
  downforce: ChannelEvidence | null;
  resistance: ChannelEvidence | null;
  contact: ChannelEvidence | null;
  balance: FrameBalance;
}

/** Thresholds of the verdict, stated with it. Shares are of distance. */
export const VERDICT_THRESHOLDS = {
  /**
   * A row counts as under target from this share of its distance (common practice, no source). Not 5 %: the first metres
   * after each turn alone can take that much of a short field.
   */
  underTargetShare: 0.1,
  /** From this share of its distance a row under target is something to act on. */
  actUnderTargetShare: 0.25,
  atLimitShare: 0.05,
  contactLostShare: 0.05,
  overTargetShare: 0.5,
  /** Fewer passes than this cannot tell a row from the ground it ran on. */
  minPassesToRank: 3,
  /** A row this far from the others, as a share of the median of all rows, is something to act on. */
  actDeviationShare: 0.15,
} as const;

export type ShareKey = "shareUnderTarget" | "shareAtLimit" | "shareContactLost";

/** Rows (from 1) whose share reaches `limit`, and the one with the largest. */
export function rowsFrom(
  evidence: ChannelEvidence | null,
  key: ShareKey,
  limit: number,
): { rows: number[]; worst: number; worstShare: number } {
  const items = evidence?.statistics.items ?? [];
  const over = items.filter((item) => (item[key] ?? 0) >= limit);
  const worst = over.reduce((most, item) => ((item[key] ?? 0) > (most?.[key] ?? 0) ? item : most), over[0]);
  return { rows: over.map((item) => item.row), worst: worst?.row ?? 0, worstShare: worst?.[key] ?? 0 };
}
