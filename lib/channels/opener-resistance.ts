import { commonStep } from "@/lib/channels/common-step";
import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { LogChannel } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { fail, succeed, type Result } from "@/lib/result";

/** Standard gravity (CGPM 1901). */
export const GRAVITY_MPS2 = 9.80665;

/** The per-row channel of a known name in newtons, or null. A pressure is never taken for a force. */
export function forceChannel(placed: PlacedLog, id: "downforce" | "margin"): LogChannel | null {
  return placed.log.channels.find((channel) => channel.id === id && channel.unit === "N" && channel.perRow) ?? null;
}

/** What the ground asked of one opener: force + weight - margin; null where margin <= 0, since then it is only a lower bound. */
export function openerResistanceN(downforceN: number, unitWeightN: number, marginN: number): number | null {
  return marginN > 0 ? downforceN + unitWeightN - marginN : null;
}

/**
 * Opener resistance of every reading, N: vertical balance of the row unit, whatever the controller did. NaN where force or
 * margin is missing, and where the wheel is off the ground (margin <= 0): the depth was not reached there, so the value
 * would only be a lower bound; `censoredShare` tells how much that is.
 */
export function openerResistance(placed: PlacedLog): Result<ResolvedChannel, string> {
  const downforce = forceChannel(placed, "downforce");
  const margin = forceChannel(placed, "margin");
  const missing = [
    ...(downforce ? [] : ["the force applied to each row (in newtons)"]),
    ...(margin ? [] : ["the margin of each row (in newtons)"]),
    ...(placed.machine ? [] : ["the machine, for the weight of its row units"]),
  ];
  if (!downforce || !margin || !placed.machine) return fail(`Opener resistance needs ${missing.join(" and ")}.`);
  const weightN = placed.machine.rowUnitMassKg * GRAVITY_MPS2;
  const values = new Float32Array(margin.values.length).fill(NaN);
  let known = 0;
  let censored = 0;
  for (let record = 0; record < placed.log.records; record++) {
    if (placed.passOf[record] === 0) continue;
    for (let at = record * margin.rows; at < (record + 1) * margin.rows; at++) {
      const balance = downforce.values[at]! + weightN - margin.values[at]!;
      if (Number.isNaN(balance)) continue;
      known++;
      if (margin.values[at]! > 0) values[at] = balance;
      else censored++;
    }
  }
  const resolution = commonStep(downforce.resolution, margin.resolution);
  return succeed({
    id: "resistance",
    unit: "N",
    rows: margin.rows,
    perRow: true,
    values,
    resolution,
    censoredShare: known > 0 ? censored / known : 0,
  });
}
