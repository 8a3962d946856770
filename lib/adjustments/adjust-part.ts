import { leaveOut, shiftLog } from "@/lib/adjustments/adjust-log";
import type { Adjustments } from "@/lib/adjustments/adjustments";
import type { LeftOut } from "@/lib/cleaning/left-out";
import type { LogPart } from "@/lib/export/export-table";

/** Adjustments with what they leave out of the whole log. */
export interface KnownAdjustments extends Adjustments {
  leftOut: LeftOut | null;
}

/** A part of a log with the log's adjustments: delays stay within passes, and a part is a pass or lies between passes. */
export function adjustPart(part: LogPart, { delaysS, leftOut }: KnownAdjustments): LogPart {
  const shifted = shiftLog(part.placed, delaysS);
  return { ...part, placed: leaveOut(shifted, leftOut && cutLeftOut(leftOut, part)) };
}

function cutLeftOut(out: LeftOut, { firstRecord, placed }: LogPart): LeftOut {
  const cut = (marks: Uint8Array | null, rows: number) =>
    marks && marks.subarray(firstRecord * rows, (firstRecord + placed.log.records) * rows);
  const channels = placed.log.channels.flatMap(({ id, rows }) => {
    const marks = cut(out.channels.get(id) ?? null, rows);
    return marks ? [[id, marks] as const] : [];
  });
  return {
    rows: out.rows,
    records: cut(out.records, 1),
    cells: cut(out.cells, out.rows),
    whole: cut(out.whole, 1),
    channels: new Map(channels),
  };
}
