import { formatBytes, formatMoment } from "@/components/ui/format-date";
import { Notice } from "@/components/ui/notice";
import { formatNumber } from "@/lib/units/format-quantity";
import { OUTSIDE_FIELD } from "@/lib/logs/note-codes";
import type { Log } from "@/lib/schemas/logs";

function formatCount(value: number): string {
  return formatNumber(value, 0);
}

/** A log that lies outside its field is told above, with what to do about it. */
function isSaidHere(note: Log["notes"][number]): boolean {
  return note.code !== OUTSIDE_FIELD;
}

/** What was found in the file, and what was noticed while reading it. */
export function LogFacts({ log }: { log: Log }) {
  const facts: [string, string][] = [
    ["Taken in", formatMoment(log.createdAt)],
    ["Size", formatBytes(log.fileBytes)],
  ];
  if (log.counts.records > 0) {
    facts.push(
      ["Records", formatCount(log.counts.records)],
      ["Rows", formatCount(log.counts.rows)],
      ["Readings", formatCount(log.counts.readings)],
      ["Passes", formatCount(log.counts.passes)],
      ["Records with a flag", formatCount(log.counts.flagged)],
      ["Lines not used", formatCount(log.counts.rejected)],
    );
  }
  return (
    <div className="space-y-4">
      <dl className="tabular grid grid-cols-[auto_1fr] gap-x-6 gap-y-1 border-t border-rule pt-4 text-table">
        {facts.map(([name, value]) => (
          <div key={name} className="contents">
            <dt className="text-ink-soft">{name}</dt>
            <dd>{value}</dd>
          </div>
        ))}
      </dl>
      {log.notes.filter(isSaidHere).map((note) => (
        <Notice key={note.code} state="look">
          {note.message}
          {note.firstLine === undefined ? null : <span className="tabular"> First at line {note.firstLine}.</span>}
        </Notice>
      ))}
    </div>
  );
}
