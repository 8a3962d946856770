import { stopReading } from "@/lib/ingest/ingest-error";
import type { NoteBook } from "@/lib/ingest/records/note-book";
import type { ReadPlan } from "@/lib/ingest/records/read-plan";

/** More lines were left out than taken: the file is not what its header says. Stops with `ragged-rows` or `missing-row`. */
export function stopAtRejected(
  { notes, plan, place }: { notes: NoteBook; plan: ReadPlan; place: string },
  [rejected, taken]: [rejected: number, taken: number],
): never {
  const code = notes.countOf("ragged-rows") > 0 ? "ragged-rows" : "bad-row-number";
  const line = notes.firstLineOf(code);
  const share = `${rejected} of ${rejected + taken} lines`;
  if (code === "ragged-rows") {
    stopReading(
      "ragged-rows",
      `${share} do not have the ${plan.columnCount} fields of the header; the first is line ${line ?? 0}. Every line must have as many fields as the header: export the log again.`,
      { line },
    );
  }
  const column = plan.names[plan.row?.field ?? 0];
  stopReading(
    "missing-row",
    `${share} have no usable row number in column '${column ?? ""}'; the first is ${place} ${line ?? 0}. Rows are whole numbers from 1; if the file counts from 0, give that column the format "from 0".`,
    { line, column },
  );
}
