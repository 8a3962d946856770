import type { Transaction } from "@/db/client";
import { findNewestAdjustments } from "@/db/queries/adjustments";
import { findLogResult } from "@/db/queries/log-results";
import { changeLog, findLogForChange, type LogRow } from "@/db/queries/logs";
import { LATE_CHANNEL, ROWS_DISPLACED, sayLateChannels } from "@/lib/alignment/say-late-channels";
import { channelWords } from "@/lib/legend/channel-words";
import { ROW_ORDER_UNCHECKED } from "@/lib/logs/note-codes";
import { FEWEST_ROWS } from "@/lib/rows/find-mirrored-rows";
import { sayUncheckedRowOrder } from "@/lib/rows/say-row-order";
import type { Scope } from "@/lib/scope";
import { delayKind, LOOK, Look, MIRRORED, StoredDelay, StoredMirror } from "@/lib/server/alignment/stored-look";

/** Code of the note on rows that are mirrored left to right. */
export const ROWS_MIRRORED = "rows-mirrored";
const CODES: readonly string[] = [LATE_CHANNEL, ROWS_DISPLACED, ROWS_MIRRORED, ROW_ORDER_UNCHECKED];

/**
 * Puts the notes of the second look right: what it found of the log's version, less what the adjustments in force mend.
 * Its earlier notes go, so none is doubled and none outlives its cause.
 */
export async function settleLookNotes(tx: Transaction, scope: Scope, logId: string): Promise<void> {
  const log = await findLogForChange(tx, scope, logId);
  if (!log) return;
  const others = log.notes.filter((note) => !CODES.includes(note.code));
  const notes = [...others, ...(await findNotes(tx, scope, log))];
  if (JSON.stringify(notes) !== JSON.stringify(log.notes)) await changeLog(tx, scope, logId, { notes });
}

async function findNotes(tx: Transaction, scope: Scope, log: LogRow): Promise<LogRow["notes"]> {
  const { id: logId, version } = log;
  const result = (kind: string) => findLogResult(tx, scope, { logId, version, kind });
  const look = Look.safeParse(await result(LOOK));
  if (!look.success) return [];
  const applied = (await findNewestAdjustments(tx, scope, logId))?.delaysS ?? {};
  const delays = [];
  for (const channel of look.data.channels) {
    const stored = StoredDelay.safeParse(await result(delayKind(channel)));
    if (!stored.success) continue;
    delays.push({
      ...stored.data,
      applied: new Map<string, number | undefined>(Object.entries(applied)).get(channel) ?? null,
    });
  }
  const mirror = StoredMirror.safeParse(await result(MIRRORED));
  return [
    ...sayLateChannels(delays, (channel) => channelWords(channel).name),
    ...(mirror.success ? rowOrderNotes(log, mirror.data) : []),
  ];
}

/** Of a log whose rows have an order at all: that it is the wrong one, or that nobody could check it. */
function rowOrderNotes({ counts, channels }: LogRow, { state, evidence, reason }: StoredMirror): LogRow["notes"] {
  if (state === "mirrored") return [{ code: ROWS_MIRRORED, count: evidence.runs, message: reason }];
  const hasRows = counts.rows >= FEWEST_ROWS && channels.some(({ perRow }) => perRow);
  if (state !== "cannot-tell" || !hasRows) return [];
  return [{ code: ROW_ORDER_UNCHECKED, count: 1, message: sayUncheckedRowOrder({ evidence, reason }) }];
}
