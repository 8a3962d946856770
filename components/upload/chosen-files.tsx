import Link from "next/link";
import type { ReactNode } from "react";
import { Button } from "@/components/ui/button";
import { formatBytes } from "@/components/ui/format-date";
import { ProgressBar } from "@/components/ui/progress-bar";
import { describeFailure } from "@/lib/api/api-problem";

/** How one file of several stands. */
export type FileState =
  | { step: "waiting" }
  | { step: "sending"; share: number }
  | { step: "taken"; logId: string | null }
  | { step: "same-bytes"; firstLogId: string }
  | { step: "failed"; error: unknown }
  | { step: "stopped" };

export interface ChosenFilesProps {
  files: readonly File[];
  states: readonly FileState[];
  logsPath: string;
  /** Absent once the files are on their way. */
  onRemove?: (file: File) => void;
}

function StateWords({ state, logsPath }: { state: FileState; logsPath: string }): ReactNode {
  switch (state.step) {
    case "waiting":
      return null;
    case "sending":
      return <span className="tabular text-ink-soft">{Math.round(state.share * 100)} % sent</span>;
    case "taken":
      return state.logId ? <Link href={`${logsPath}/${state.logId}`}>Taken in: open it</Link> : <span>Sent</span>;
    case "same-bytes":
      return <Link href={`${logsPath}/${state.firstLogId}`}>Already in this field: open the first one</Link>;
    case "failed":
      return <span className="text-clay">Not taken in: {describeFailure(state.error)}</span>;
    case "stopped":
      return <span>Stopped, not kept</span>;
  }
}

/** The files that were chosen, and how far each is. */
export function ChosenFiles({ files, states, logsPath, onRemove }: ChosenFilesProps) {
  return (
    <ul aria-label="Chosen files" className="divide-y divide-rule border-y border-rule">
      {files.map((file, index) => {
        const state = states[index] ?? { step: "waiting" };
        return (
          <li key={`${index} ${file.name}`} className="space-y-1 py-2">
            <div className="flex flex-wrap items-center justify-between gap-x-3">
              <span className="min-w-0 break-words">
                <span className="font-semibold">{file.name}</span>{" "}
                <span className="whitespace-nowrap text-ink-soft">{formatBytes(file.size)}</span>
              </span>
              {onRemove ? (
                <Button kind="quiet" aria-label={`Leave out ${file.name}`} onClick={() => onRemove(file)}>
                  Leave out
                </Button>
              ) : null}
            </div>
            {state.step === "sending" ? <ProgressBar share={state.share} label={`Sent of ${file.name}`} /> : null}
            <p className="text-table">
              <StateWords state={state} logsPath={logsPath} />
            </p>
          </li>
        );
      })}
    </ul>
  );
}

/** How far each of several files in one form is, when a share of the whole has left: they leave one after the other. */
export function partStates(files: readonly File[], share: number): FileState[] {
  let left = share * files.reduce((sum, file) => sum + file.size, 0);
  return files.map(({ size }) => {
    const sent = Math.max(0, Math.min(size, left));
    left -= size;
    if (sent >= size) return { step: "taken", logId: null };
    return sent > 0 ? { step: "sending", share: sent / size } : { step: "waiting" };
  });
}
