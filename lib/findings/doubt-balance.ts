import type { FrameBalance } from "@/lib/ballast/frame-balance";
import type { ChannelEvidence } from "@/lib/findings/row-evidence";
import { median } from "@/lib/statistics/median";

/** A frame said to be lifted on this share of the area cannot have rows that held their margin there. */
const DOUBTFUL_LIFTED_SHARE = 0.2;

/**
 * Takes the word of a frame's balance back where the log contradicts the machine's description: the wheels would have
 * carried next to nothing on much of the area, yet the typical row was under target on less than a quarter of that. The
 * state is then "unknown", with the contradiction named as what is missing.
 */
export function doubtBalance(balance: FrameBalance, margin: ChannelEvidence | null): FrameBalance {
  const lifted = balance.shareLiftedM2 ?? 0;
  const shares = margin?.statistics.items.flatMap((item) => item.shareUnderTarget ?? []) ?? [];
  if (lifted < DOUBTFUL_LIFTED_SHARE || shares.length === 0 || median(shares) >= lifted / 4) return balance;
  const percent = Math.round(100 * lifted);
  const missing = [
    `a machine whose description fits this log (by this one the frame's wheels carried next to nothing on ${percent} % of the area, yet the rows held their margin there)`,
  ];
  return { ...balance, state: "unknown", missing };
}
