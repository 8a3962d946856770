import { resolveChannelOrReason } from "@/lib/channels/resolve-channel";
import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { fail, succeed, type Result } from "@/lib/result";
import type { LimitZoneKind } from "@/lib/schemas/limit-zones";
import { atLimitFromN, underTargetBelowN } from "@/lib/statistics/row-shares";
import { sortWeighted } from "@/lib/statistics/sort-weighted";
import { weightedQuantileSorted } from "@/lib/statistics/weighted-quantile";

/** Seed within this of the wanted depth counts as there: common practice in depth checks, no source. */
const DEPTH_TOLERANCE_M = 0.006;

/** What a kind of zone is made of. */
export interface LimitMask {
  channel: ResolvedChannel;
  /** 1 where a reading is past the limit, 0 where not, NaN where there is none. */
  mask: ResolvedChannel;
  /** SI. */
  threshold: number;
}

export interface LimitChoice {
  kind: LimitZoneKind;
  /** Of too shallow; 6 mm less than the median of the log where left out. */
  depthM?: number;
  distances: Float32Array;
}

const CHANNELS: Record<LimitZoneKind, string> = {
  "under-target": "margin",
  "over-target": "margin",
  "at-limit": "downforce",
  "too-shallow": "depth",
};

/** Where a log is past a limit, or the reason in plain words why nobody can say. */
export function limitMask(placed: PlacedLog, choice: LimitChoice): Result<LimitMask, string> {
  const resolved = resolveChannelOrReason(placed, CHANNELS[choice.kind]);
  if (!resolved.ok) return resolved;
  const channel = resolved.value;
  if (!channel.perRow) {
    return fail(`"${channel.id}" is logged once for the whole machine, so there are no zones of rows.`);
  }
  const threshold = thresholdOf(placed, channel, choice);
  if (!threshold.ok) return threshold;
  const limit = threshold.value;
  const holds = HOLDS[choice.kind];
  const values = channel.values.map((value) => (Number.isNaN(value) ? NaN : +holds(value, limit)));
  const mask = { ...channel, unit: "boolean" as const, values, resolution: 1, censoredShare: null };
  return succeed({ channel, mask, threshold: limit });
}

const HOLDS: Record<LimitZoneKind, (value: number, limit: number) => boolean> = {
  "under-target": (value, limit) => value < limit,
  "over-target": (value, limit) => value > limit,
  "at-limit": (value, limit) => value >= limit,
  "too-shallow": (value, limit) => value < limit,
};

function thresholdOf(placed: PlacedLog, channel: ResolvedChannel, choice: LimitChoice): Result<number, string> {
  if (choice.kind === "at-limit") {
    const from = atLimitFromN(placed, channel);
    return from === null ? fail("At the limit needs the machine's highest force.") : succeed(from);
  }
  if (choice.kind === "too-shallow") return shallowBelow(placed, channel, choice);
  const below = underTargetBelowN(placed, channel);
  const { targetMarginN, marginDeadbandN = 0 } = placed.machine ?? {};
  if (below === null || targetMarginN === undefined) {
    return fail("Under and over target need the machine's target margin, and the margin in newtons.");
  }
  return succeed(choice.kind === "under-target" ? below : targetMarginN + marginDeadbandN);
}

function shallowBelow(
  placed: PlacedLog,
  channel: ResolvedChannel,
  { depthM, distances }: LimitChoice,
): Result<number, string> {
  if (channel.unit !== "m") return fail("Too shallow needs the depth of each row, as a length.");
  if (depthM !== undefined) return succeed(depthM);
  const inPasses = channel.values.map((value, at) =>
    placed.passOf[Math.floor(at / channel.rows)] === 0 ? NaN : value,
  );
  const middle = weightedQuantileSorted(sortWeighted(inPasses, distances), 0.5);
  return Number.isFinite(middle) ? succeed(middle - DEPTH_TOLERANCE_M) : fail("No row has a depth in a pass.");
}
