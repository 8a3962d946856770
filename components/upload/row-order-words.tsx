import { ROW_ORDER_UNCHECKED } from "@/lib/logs/note-codes";
import type { Log } from "@/lib/schemas/logs";

/** Quietly, since nothing is wrong: that the order of the rows is only what the file or its reader said. */
export function RowOrderWords({ log }: { log: Pick<Log, "notes"> }) {
  const note = log.notes.find(({ code }) => code === ROW_ORDER_UNCHECKED);
  return note ? <p className="text-table text-ink-soft">{note.message}</p> : null;
}
