import { formatBytes, formatMoment } from "@/components/ui/format-date";
import { Notice } from "@/components/ui/notice";
import { RowOrderWords } from "@/components/upload/row-order-words";
import { formatNumber } from "@/lib/units/format-quantity";
import { OUTSIDE_FIELD, ROW_ORDER_UNCHECKED } from "@/lib/logs/note-codes";
import type { Log } from "@/lib/schemas/logs";

function formatCount(value: number): string {
  return formatNumber(value, 0);
}

/** A log that lies outside its field is told above, with what to do about it; that nothing is known is no warning. */
function isSaidHere(note: Log["notes"][number]): boolean {
  return note.code !== OUTSIDE_FIELD && note.code !== ROW_ORDER_UNCHECKED;
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
      <FileFacts log={log} />
      {log.notes.filter(isSaidHere).map((note) => (
        <Notice key={`${note.code} ${note.file ?? ""} ${note.message}`} state="look">
          {note.message}
          {note.firstLine === undefined ? null : (
            <span className="tabular">
              {" "}
              First at line {note.firstLine}
              {note.file === undefined ? null : ` of ${note.file}`}.
            </span>
          )}
        </Notice>
      ))}
      <RowOrderWords log={log} />
    </div>
  );
}

/** The files of a log that came in several, each to be had back. */
function FileFacts({ log }: { log: Log }) {
  const files = log.files ?? [];
  if (files.length < 2) return null;
  return (
    <div className="space-y-1">
      <h2 className="text-table text-ink-soft">Files of this log, as they were sent</h2>
      <ul className="tabular divide-y divide-rule border-y border-rule text-table">
        {files.map((file) => (
          <li key={file.sha256} className="flex flex-wrap items-center justify-between gap-x-4 py-1">
            <a
              href={`/api/v1/logs/${log.id}/original?sha256=${file.sha256}`}
              download={file.name}
              className="inline-flex min-h-11 items-center break-all md:min-h-8"
            >
              {file.name}
            </a>
            <span className="text-ink-soft">
              {formatBytes(file.bytes)}
              {file.records === null ? null : `, ${formatCount(file.records)} records`}
              {file.copies.length > 0 ? `, sent ${file.copies.length + 1} times` : null}
            </span>
          </li>
        ))}
      </ul>
    </div>
  );
}
