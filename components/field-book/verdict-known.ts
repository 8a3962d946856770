import type { Log, VerdictBody } from "@/lib/schemas/logs";

/** What of a verdict's counts could be judged at all: a count of a thing that is not known is no nought. */
export interface VerdictKnown {
  underTarget: boolean;
  atLimit: boolean;
}

/** As the verdict says it itself; of one worked out before verdicts did, what was found or missing tells. */
export function verdictKnown(verdict: VerdictBody, log: Pick<Log, "machineId">): VerdictKnown {
  if (verdict.known) return verdict.known;
  const has = (kind: string) => verdict.findings.some((finding) => finding.kind === kind);
  const lacksLimit = verdict.findings.some(
    ({ kind, sentence }) => kind === "cannot-judge" && /no force limit|which machine/.test(sentence),
  );
  return {
    underTarget: verdict.rowsUnderTarget.length > 0 || has("rows-under-target") || has("target-held"),
    atLimit: verdict.rowsAtLimit.length > 0 || (log.machineId !== null && !lacksLimit),
  };
}
