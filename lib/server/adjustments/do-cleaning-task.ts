import { LRUCache } from "lru-cache";
import { isAsRead } from "@/lib/adjustments/adjustments";
import { leaveOut, shiftLog } from "@/lib/adjustments/adjust-log";
import { countRules } from "@/lib/cleaning/count-rules";
import { chosenRules } from "@/lib/cleaning/default-rules";
import { describeEffect, summariseChannels, type SummarisedChannel } from "@/lib/cleaning/describe-effect";
import { combineMasks } from "@/lib/cleaning/left-out";
import { unpackPlacedLog } from "@/lib/logs/packed-placed-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
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
  const cleaned = leaveOut(shifted, leftOut);
  if (task.kind === "answers") return adjustedAnswers(cleaned);
  const asLogged = summariseOnce(task.logKey, placed);
  const then = isAsRead(task.adjustments) ? asLogged : summariseChannels(cleaned);
  return { ...countRules(shifted, cleaning, maskOf), effect: describeEffect(asLogged, then) };
}

const summarised = new LRUCache<string, SummarisedChannel[]>({ max: 32 });

/** The log as it was logged: the same for whatever rules somebody tries. */
function summariseOnce(logKey: string, placed: PlacedLog): SummarisedChannel[] {
  const known = summarised.get(logKey) ?? summariseChannels(placed);
  summarised.set(logKey, known);
  return known;
}
