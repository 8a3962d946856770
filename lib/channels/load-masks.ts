import { forceChannel } from "@/lib/channels/opener-resistance";
import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { LogChannel } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { fail, succeed, type Result } from "@/lib/result";
import { atLimitFromN, underTargetBelowN } from "@/lib/statistics/row-shares";

type MaskId = "underTarget" | "atLimit";

/** 1 where a row's margin was under target less what still counts as on it, 0 where not, NaN where nobody knows. */
export function underTarget(placed: PlacedLog): Result<ResolvedChannel, string> {
  const margin = forceChannel(placed, "margin");
  if (!margin) return fail("Under target needs the margin of each row (in newtons).");
  const below = underTargetBelowN(placed, margin);
  if (below === null) return fail("Under target needs the machine's target margin.");
  return succeed(maskOf(placed, margin, { id: "underTarget", holds: (value) => value < below }));
}

/** 1 where the force on a row was at its limit (to 1 % or the log's own rounding), 0 where not, NaN where nobody knows. */
export function atLimit(placed: PlacedLog): Result<ResolvedChannel, string> {
  const downforce = forceChannel(placed, "downforce");
  if (!downforce) return fail("At the limit needs the force applied to each row (in newtons).");
  const from = atLimitFromN(placed, downforce);
  if (from === null) return fail("At the limit needs the machine's highest force.");
  return succeed(maskOf(placed, downforce, { id: "atLimit", holds: (value) => value >= from }));
}

/** Of readings in passes, as statistics count them. */
function maskOf(
  placed: PlacedLog,
  { rows, values: read }: LogChannel,
  { id, holds }: { id: MaskId; holds: (value: number) => boolean },
): ResolvedChannel {
  const values = new Float32Array(read.length).fill(NaN);
  for (let record = 0; record < placed.log.records; record++) {
    if (placed.passOf[record] === 0) continue;
    for (let at = record * rows; at < (record + 1) * rows; at++) {
      const value = read[at]!;
      if (!Number.isNaN(value)) values[at] = holds(value) ? 1 : 0;
    }
  }
  return { id, unit: "boolean", rows, perRow: true, values, resolution: 1, censoredShare: null };
}
