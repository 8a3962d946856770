import type { MachineLog } from "@/lib/logs/machine-log";

/** Turns the rows of every per-row channel round in place: the last logged becomes row 1, leftmost looking forward. */
export function turnRows(log: MachineLog): void {
  for (const { perRow, rows, values } of log.channels) {
    if (!perRow) continue;
    for (let at = 0; at + rows <= values.length; at += rows) values.subarray(at, at + rows).reverse();
  }
}
