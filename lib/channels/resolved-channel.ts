import type { AnyChannelId } from "@/lib/logs/channel";
import type { SiUnit } from "@/lib/logs/machine-log";

/** A logged or derived channel, laid out like a logged one. */
export interface ResolvedChannel {
  id: AnyChannelId;
  unit: SiUnit;
  rows: number;
  perRow: boolean;
  values: Float32Array;
  resolution: number | null;
  /**
   * Share of the readings in passes that are only a lower bound and left out (resistance with the wheel off the ground);
   * null where nothing is censored by nature.
   */
  censoredShare: number | null;
  /** Values are names, not amounts: nothing may be averaged. */
  isCode?: boolean;
  /** Of names numbered 1 .. so many: where several fall together the one over the longest distance stands for them. */
  codeCount?: number;
}
