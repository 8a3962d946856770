"use client";

import { formatDay } from "@/components/ui/format-date";
import type { Log } from "@/lib/schemas/logs";

const KIND_WORDS: Record<Log["kind"], string> = { seeding: "seeding", harvest: "harvest", other: "log" };

function logWords(log: Log): string {
  const day = formatDay(log.startedAt);
  return `${log.name}${day ? ` · ${day}` : ""} · ${KIND_WORDS[log.kind]}`;
}

export interface LogPickerProps {
  logs: readonly Log[];
  chosen: Log;
  onChoose: (logId: string) => void;
}

/** Which log of the field is open. */
export function LogPicker({ logs, chosen, onChoose }: LogPickerProps) {
  if (logs.length === 1) return <p className="min-w-0 truncate text-table text-ink-soft">{logWords(chosen)}</p>;
  return (
    <label className="flex min-w-0 items-center gap-2 text-table text-ink-soft">
      <span className="sr-only">Log</span>
      <select
        value={chosen.id}
        onChange={(event) => onChoose(event.target.value)}
        className="min-h-11 min-w-0 max-w-full truncate rounded border border-edge bg-sheet px-2 text-ink md:min-h-8 md:max-w-52"
      >
        {logs.map((log) => (
          <option key={log.id} value={log.id}>
            {logWords(log)}
          </option>
        ))}
      </select>
    </label>
  );
}
