"use client";

import { useLogs, useVerdict } from "@/components/hooks/use-logs";
import { StateWord, type MarkState } from "@/components/ui/state-mark";
import { describeLogStatus } from "@/components/upload/log-state";
import { OUTSIDE_FIELD } from "@/lib/logs/note-codes";
import type { Log, VerdictBody } from "@/lib/schemas/logs";

interface StateInWords {
  mark: MarkState;
  word: string;
}

/** The gravest finding decides. */
export function verdictState(verdict: VerdictBody): StateInWords {
  const severities = verdict.findings.map((finding) => finding.severity);
  if (severities.includes("act")) return { mark: "act", word: "Act before the next field" };
  if (severities.includes("look")) return { mark: "look", word: "Look at it" };
  return { mark: "fine", word: "Fine" };
}

/** The log that speaks for a field: the newest seeding log that has been read. A harvest log has no pass verdict. */
export function speakingLog(logs: readonly Log[]): Log | undefined {
  const ready = logs.filter((log) => log.status === "ready");
  return ready.find((log) => log.kind === "seeding") ?? ready[0] ?? logs[0];
}

/** "1 log waits for you": uploads that nobody has mapped, or that could not be read. Null when none. */
export function sayWaiting(logs: readonly Log[]): string | null {
  const waiting = logs.filter((log) => log.status === "needs-mapping" || log.status === "failed").length;
  if (waiting === 0) return null;
  return waiting === 1 ? "1 log waits for you" : `${waiting} logs wait for you`;
}

export interface FieldVerdictStateProps {
  fieldId: string;
  logCount: number;
  /** Whether what waits is this person's to do. */
  mayUpload: boolean;
}

/** How the newest log of a field came out, and whether another waits for the person. */
export function FieldVerdictState({ fieldId, logCount, mayUpload }: FieldVerdictStateProps) {
  if (logCount === 0) return <StateWord state="none">No log yet</StateWord>;
  return <NewestLogState fieldId={fieldId} mayUpload={mayUpload} />;
}

const LOOK_BACK = 50;

function NewestLogState({ fieldId, mayUpload }: Omit<FieldVerdictStateProps, "logCount">) {
  const logs = useLogs(fieldId, LOOK_BACK).data?.items ?? [];
  const speaking = speakingLog(logs);
  if (!speaking) return null;
  const isRead = speaking.status === "ready";
  const waiting = mayUpload && isRead ? sayWaiting(logs) : null;
  return (
    <span className="inline-flex flex-col">
      <SpokenState log={speaking} />
      {waiting ? <span className="text-table text-ink-soft">{waiting}</span> : null}
    </span>
  );
}

function SpokenState({ log }: { log: Log }) {
  const hasVerdict = log.status === "ready" && log.kind === "seeding";
  const verdict = useVerdict(log.id, log.version, hasVerdict);
  if (log.notes.some((note) => note.code === OUTSIDE_FIELD) && log.status === "ready") {
    return <StateWord state="look">Look: readings lie elsewhere</StateWord>;
  }
  if (verdict.isLoading) return <span className="text-ink-soft">…</span>;
  const { mark, word } = hasVerdict && verdict.data ? verdictState(verdict.data) : describeLogStatus(log.status);
  return <StateWord state={mark}>{word}</StateWord>;
}
