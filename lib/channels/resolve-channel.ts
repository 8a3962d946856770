import { atLimit, underTarget } from "@/lib/channels/load-masks";
import { marginByForce } from "@/lib/channels/margin-by-force";
import { openerResistance } from "@/lib/channels/opener-resistance";
import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import { rowSpeed } from "@/lib/channels/row-speed";
import { workedTime } from "@/lib/channels/worked-time";
import { leftOutNumbers } from "@/lib/cleaning/left-out";
import { isChannelId, type AnyChannelId } from "@/lib/logs/channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { fail, succeed, type Result } from "@/lib/result";
import { deviationFromOthers } from "@/lib/statistics/row-deviation";

export type { ResolvedChannel } from "@/lib/channels/resolved-channel";

/**
 * A channel of a log by name, logged or derived (`resistance`, `rowSpeed`, `flags`, `underTarget`, `atLimit`,
 * `marginByForce`, `deviation:<channel>`), or the reason in plain words why this log cannot give it.
 */
export function resolveChannelOrReason(placed: PlacedLog, channelId: string): Result<ResolvedChannel, string> {
  if (!isChannelId(channelId)) return fail(`"${channelId}" is not the name of a channel.`);
  if (channelId === "resistance") return openerResistance(placed);
  if (channelId === "rowSpeed") return succeed(rowSpeed(placed));
  if (channelId === "time") return workedTime(placed);
  if (channelId === "flags") return succeed(flagsChannel(placed));
  if (channelId === "underTarget") return underTarget(placed);
  if (channelId === "atLimit") return atLimit(placed);
  if (channelId === "marginByForce") return marginByForce(placed);
  if (channelId.startsWith("deviation:")) return deviationChannel(placed, channelId);
  const logged = placed.log.channels.find((channel) => channel.id === channelId);
  return logged ? succeed({ ...logged, censoredShare: null }) : fail(`This log has no channel "${channelId}".`);
}

/** Number of the first cleaning rule that takes out a reading of the row there; NaN where all are kept. */
function flagsChannel(placed: PlacedLog): ResolvedChannel {
  const { rows } = placed.geometry;
  const values = leftOutNumbers(placed.leftOut ?? null, { records: placed.log.records, rows });
  return { id: "flags", unit: "1", rows, perRow: true, values, resolution: 1, censoredShare: null, isCode: true };
}

/** The same, null where the log cannot give it. */
export function resolveChannel(placed: PlacedLog, channelId: string): ResolvedChannel | null {
  const resolved = resolveChannelOrReason(placed, channelId);
  return resolved.ok ? resolved.value : null;
}

/** Each reading less the median of the other rows at the same record. */
function deviationChannel(placed: PlacedLog, channelId: AnyChannelId): Result<ResolvedChannel, string> {
  const base = resolveChannelOrReason(placed, channelId.slice("deviation:".length));
  if (!base.ok) return base;
  if (!base.value.perRow || base.value.rows < 2) {
    return fail(`"${base.value.id}" is logged once for the whole machine, so rows cannot be compared.`);
  }
  if (base.value.isCode) return fail(`"${base.value.id}" holds names, which have no difference.`);
  const { values, rows, resolution } = base.value;
  // The median of an even number of readings may lie half a step between two of them.
  const step = resolution === null ? null : resolution / 2;
  return succeed({ ...base.value, id: channelId, values: deviationFromOthers(values, rows), resolution: step });
}
