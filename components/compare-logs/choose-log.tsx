"use client";

import { useId } from "react";
import { useFields } from "@/components/hooks/use-fields";
import { useLogs } from "@/components/hooks/use-logs";
import { formatDay } from "@/components/ui/format-date";
import type { Log } from "@/lib/schemas/logs";

export interface ChooseLogProps {
  /** "Before" or "After". */
  title: string;
  fieldId: string;
  log: Log | undefined;
  onField: (fieldId: string) => void;
  onLog: (logId: string) => void;
  /** A log that the other side has already. */
  taken: string | null;
}

const SELECT = "min-h-11 w-full min-w-0 truncate rounded border border-edge bg-sheet px-2 text-ink md:min-h-9";

/** One side of a comparison: a field, then one of its logs that have been read. */
export function ChooseLog({ title, fieldId, log, onField, onLog, taken }: ChooseLogProps) {
  const id = useId();
  const fields = useFields();
  const logs = useLogs(fieldId);
  const ready = (logs.data?.items ?? []).filter((one) => one.status === "ready" && one.id !== taken);
  return (
    <fieldset className="min-w-0 space-y-2">
      <legend className="pb-1 font-semibold">{title}</legend>
      <div>
        <label htmlFor={`${id}-field`} className="text-table text-ink-soft">
          Field
        </label>
        <select id={`${id}-field`} className={SELECT} value={fieldId} onChange={(event) => onField(event.target.value)}>
          {(fields.data?.items ?? []).map((field) => (
            <option key={field.id} value={field.id}>
              {field.name}
            </option>
          ))}
        </select>
      </div>
      <div>
        <label htmlFor={`${id}-log`} className="text-table text-ink-soft">
          Log
        </label>
        <select
          id={`${id}-log`}
          className={SELECT}
          value={log?.id ?? ""}
          onChange={(event) => onLog(event.target.value)}
        >
          <option value="" disabled>
            {logs.data && ready.length === 0 ? "No other log here has been read" : "Choose a log"}
          </option>
          {ready.map((one) => (
            <option key={one.id} value={one.id}>
              {[one.name, formatDay(one.startedAt), one.kind].filter(Boolean).join(" · ")}
            </option>
          ))}
        </select>
      </div>
    </fieldset>
  );
}
