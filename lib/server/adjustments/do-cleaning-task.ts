import { isAsRead } from "@/lib/adjustments/adjustments";
import { leaveOut, shiftLog } from "@/lib/adjustments/adjust-log";
import { countRules } from "@/lib/cleaning/count-rules";
import { chosenRules } from "@/lib/cleaning/default-rules";
import { describeEffect } from "@/lib/cleaning/describe-effect";
import { combineMasks } from "@/lib/cleaning/left-out";
import { unpackPlacedLog } from "@/lib/logs/packed-placed-log";
import type { CleaningResults, CleaningTask } from "@/lib/server/adjustments/cleaning-task";
import { maskFinder } from "@/lib/server/adjustments/rule-masks";
import { adjustedAnswers } from "@/lib/server/adjustments/adjusted-answers";

/** Works out what was asked; runs in the cleaning thread. */
export function doCleaningTask(task: Omit<CleaningTask, "id">): CleaningResults[CleaningTask["kind"]] {
  const placed = unpackPlacedLog(task.packed);
  const { delaysS, cleaning } = task.adjustments;
  const shifted = shiftLog(placed, delaysS);
  const maskOf = maskFinder(`${task.logKey} ${JSON.stringify(delaysS)}`, shifted, cleaning);
  const codes = chosenRules(cleaning);
  const leftOut =
    codes.length === 0
      ? null
      : combineMasks(
          shifted.geometry.rows,
          codes.map((code) => ({ code, mask: maskOf(code) })),
        );
  if (task.kind === "left-out") return leftOut;
  const cleaned = isAsRead(task.adjustments) ? placed : leaveOut(shifted, leftOut);
  if (task.kind === "answers") return adjustedAnswers(cleaned);
  return { ...countRules(shifted, cleaning, maskOf), effect: describeEffect(placed, cleaned) };
}
