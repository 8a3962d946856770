import type { TimeLogFiles } from "@/lib/ingest/formats/task-data/open-task-data";
import type { TimeLog } from "@/lib/ingest/formats/task-data/open-time-log";

/** Ends the id of a group of time logs; no time log is called so. */
const GROUP = "/*";

/** Several time logs of one task by one machine: a controller begins a new one when it is switched on. */
export interface TaskGroup<T> {
  id: string;
  label: string;
  logs: T[];
}

type Grouped = Pick<TimeLog, "id" | "names" | "device"> & Pick<TimeLogFiles, "task" | "taskLabel">;

/**
 * The groups of two or more time logs that are one log in parts: of the same task, with the same columns in the same order
 * and the same description of the machine.
 */
export function groupByTask<T extends Grouped>(logs: readonly T[]): TaskGroup<T>[] {
  const alike = new Map<string, T[]>();
  for (const log of logs) {
    const key = JSON.stringify([log.task, log.names, log.device]);
    alike.set(key, [...(alike.get(key) ?? []), log]);
  }
  const seen = new Map<string, number>();
  return [...alike.values()].flatMap((members) => {
    const [first] = members;
    if (!first || members.length < 2) return [];
    // Of a task that two machines worked at there may be two groups.
    const nth = (seen.get(first.task) ?? 0) + 1;
    seen.set(first.task, nth);
    const id = `${first.task}${GROUP}${nth === 1 ? "" : nth}`;
    return [{ id, label: `All of ${first.taskLabel}, ${members.length} time logs`, logs: members }];
  });
}

/** Whether a mapping means a group, so that every time log of its task must be looked at. */
export function isGroupId(layer: string | undefined): layer is string {
  return layer !== undefined && /\/\*\d*$/.test(layer);
}
