"use client";

import { useLogs, useVerdict } from "@/components/hooks/use-logs";
import { StateWord, type MarkState } from "@/components/ui/state-mark";
import { describeLogStatus } from "@/components/upload/log-state";
import type { VerdictBody } from "@/lib/schemas/logs";

/** The gravest finding decides. */
export function verdictState(verdict: VerdictBody): { mark: MarkState; word: string } {
  const severities = verdict.findings.map((finding) => finding.severity);
  if (severities.includes("act")) return { mark: "act", word: "Act before the next field" };
  if (severities.includes("look")) return { mark: "look", word: "Look at it" };
  return { mark: "fine", word: "Fine" };
}

/** How the newest log of a field came out. */
export function FieldVerdictState({ fieldId, logCount }: { fieldId: string; logCount: number }) {
  if (logCount === 0) return <StateWord state="none">No log yet</StateWord>;
  return <NewestLogState fieldId={fieldId} />;
}

const LOOK_BACK = 20;

function NewestLogState({ fieldId }: { fieldId: string }) {
  const logs = useLogs(fieldId, LOOK_BACK).data?.items;
  // A harvest log has no pass verdict; the seeding log before it has.
  const newest = logs?.find((log) => log.kind === "seeding") ?? logs?.[0];
  const verdict = useVerdict(newest?.id, newest?.version ?? 0, newest?.status === "ready" && newest.kind === "seeding");
  if (!newest) return null;
  if (verdict.data) {
    const { mark, word } = verdictState(verdict.data);
    return <StateWord state={mark}>{word}</StateWord>;
  }
  if (verdict.isLoading) return <span className="text-ink-soft">…</span>;
  const { mark, word } = describeLogStatus(newest.status);
  return <StateWord state={mark}>{word}</StateWord>;
}
