import type { ChannelId } from "@/lib/logs/channel";
import type { PlacedLog } from "@/lib/logs/placed-log";

/** What one rule takes out; 1 where it does. Absent parts take out nothing. */
export interface RuleMask {
  /** One entry a record: everything logged at that moment. */
  records?: Uint8Array;
  /** Row-major by record, as per-row channels are: the reading of that row in every per-row channel. */
  cells?: Uint8Array;
  /** One entry a record: readings logged once for the whole machine. */
  whole?: Uint8Array;
  /** Laid out like the channel: its readings alone. */
  channels?: ReadonlyMap<ChannelId, Uint8Array>;
}

/** What a rule judges: the log as it was read (with channels moved by their delays), whatever other rules take out. */
export interface RuleInput {
  placed: PlacedLog;
  /** Metres along its pass at each record; NaN in no pass. */
  alongM: Float64Array;
}

/** How far along its pass the machine is at each record, 0 at the first; NaN for records in no pass. */
export function distanceAlongPasses(placed: PlacedLog): Float64Array {
  const alongM = new Float64Array(placed.log.records).fill(NaN);
  for (const pass of placed.passes) {
    let last = -1;
    let metres = 0;
    for (let record = pass.first; record < pass.first + pass.records; record++) {
      if (placed.passOf[record] !== pass.pass) continue;
      if (last >= 0) {
        const eastM = placed.originEastM[record]! - placed.originEastM[last]!;
        metres += Math.hypot(eastM, placed.originNorthM[record]! - placed.originNorthM[last]!);
      }
      alongM[record] = metres;
      last = record;
    }
  }
  return alongM;
}

/** Numbers of the records that count for a pass, in order. */
export function passMembers(placed: PlacedLog, pass: PlacedLog["passes"][number]): number[] {
  const members: number[] = [];
  for (let record = pass.first; record < pass.first + pass.records; record++) {
    if (placed.passOf[record] === pass.pass) members.push(record);
  }
  return members;
}
