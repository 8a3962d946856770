import { StateWord, type MarkState } from "@/components/ui/state-mark";
import { describeLogStatus } from "@/components/upload/log-state";
import type { Field, NewestLog } from "@/lib/schemas/fields";

interface StateInWords {
  mark: MarkState;
  word: string;
}

const SEVERITY_WORDS: Record<NonNullable<NewestLog["severity"]>, StateInWords> = {
  act: { mark: "act", word: "Act before the next field" },
  look: { mark: "look", word: "Look at it" },
  ok: { mark: "fine", word: "Fine" },
};

/** How the log that speaks for a field came out. */
export function fieldVerdictWords({ newestLog }: Pick<Field, "newestLog">): StateInWords {
  if (!newestLog) return { mark: "none", word: "No log yet" };
  const isRead = newestLog.status === "ready";
  if (isRead && newestLog.isElsewhere) return { mark: "look", word: "Look: readings lie elsewhere" };
  return newestLog.severity ? SEVERITY_WORDS[newestLog.severity] : describeLogStatus(newestLog.status);
}

/** "1 log waits for you": uploads that nobody has mapped, or that could not be read. Null when none. */
export function sayWaiting(count: number): string | null {
  if (count === 0) return null;
  return count === 1 ? "1 log waits for you" : `${count} logs wait for you`;
}

export interface FieldVerdictStateProps {
  field: Pick<Field, "newestLog" | "waitingLogs">;
  /** Whether what waits is this person's to do. */
  mayUpload: boolean;
}

/** How the newest log of a field came out, and whether another waits for the person. */
export function FieldVerdictState({ field, mayUpload }: FieldVerdictStateProps) {
  const { mark, word } = fieldVerdictWords(field);
  // Where none was read, the state is about what waits already.
  const waiting = mayUpload && field.newestLog?.status === "ready" ? sayWaiting(field.waitingLogs) : null;
  return (
    <span className="inline-flex flex-col">
      <StateWord state={mark}>{word}</StateWord>
      {waiting ? <span className="text-table text-ink-soft">{waiting}</span> : null}
    </span>
  );
}
