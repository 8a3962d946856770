import type { CleaningRule } from "@/lib/cleaning/rule-catalogue";
import { passMembers, type RuleInput, type RuleMask } from "@/lib/cleaning/rule-mask";
import { turnDegrees } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";

/**
 * Records about which the heading turns by more than `turnDeg` within `withinM`: half of it before and half behind, as far
 * as the machine worked on without a break. A turn driven with the machine down is cut into two passes in its middle; it is
 * looked at as one.
 */
export function findTurning({ placed }: RuleInput, rule: CleaningRule<"turning">): RuleMask {
  const records = new Uint8Array(placed.log.records);
  for (const run of unbrokenRuns(placed)) markTurns(placed, run, { rule, records });
  return { records };
}

/** Members of passes, those of passes that follow each other without a record between joined. */
function unbrokenRuns(placed: PlacedLog): number[][] {
  const runs: number[][] = [];
  let endedAt = -1;
  for (const pass of [...placed.passes].sort((a, b) => a.first - b.first)) {
    const members = passMembers(placed, pass);
    const open = runs.at(-1);
    if (open && pass.first === endedAt) for (const member of members) open.push(member);
    else runs.push(members);
    endedAt = pass.first + pass.records;
  }
  return runs;
}

interface Marking {
  rule: CleaningRule<"turning">;
  records: Uint8Array;
}

function markTurns(placed: PlacedLog, run: readonly number[], { rule, records }: Marking): void {
  const travelledM = travelAlong(placed, run);
  const half = rule.withinM / 2;
  let back = 0;
  let ahead = 0;
  for (let k = 0; k < run.length; k++) {
    while (travelledM[k]! - travelledM[back]! > half) back++;
    while (ahead + 1 < run.length && travelledM[ahead + 1]! - travelledM[k]! <= half) ahead++;
    const turn = turnDegrees(placed.headingDeg[run[back]!]!, placed.headingDeg[run[ahead]!]!);
    if (Math.abs(turn) > rule.turnDeg) records[run[k]!] = 1;
  }
}

function travelAlong({ originEastM, originNorthM }: PlacedLog, run: readonly number[]): Float64Array {
  const travelledM = new Float64Array(run.length);
  for (let k = 1; k < run.length; k++) {
    const [from, to] = [run[k - 1]!, run[k]!];
    const stepM = Math.hypot(originEastM[to]! - originEastM[from]!, originNorthM[to]! - originNorthM[from]!);
    travelledM[k] = travelledM[k - 1]! + stepM;
  }
  return travelledM;
}
