import type { ChannelOnGround } from "@/lib/pass-figures/pass-readings";

/** A log of a comparison: its channel on the ground, who it is, and which ways the harvest of its field was driven. */
export interface LogToCompare {
  from: ChannelOnGround;
  logId: string;
  name: string;
  fieldId: string;
  startedAt: string | null;
  harvestAxesDeg: readonly number[];
}
