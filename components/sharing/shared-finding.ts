import { sayFinding } from "@/lib/findings/say-finding";
import type { Finding, VerdictBody } from "@/lib/schemas/logs";
import type { UnitSystem } from "@/lib/units/display-unit";

const GRAVITY: Record<Finding["severity"], number> = { act: 2, look: 1, ok: 0 };

/** Doubt about the readings themselves comes before all that was read from them. */
function gravity({ kind, severity }: Finding): number {
  return kind === "readings-doubtful" ? 3 : GRAVITY[severity];
}

/** The gravest findings first; equals keep the engine's order. */
export function rankFindings(verdict: VerdictBody): Finding[] {
  return verdict.findings
    .map((finding, index) => ({ finding, index }))
    .sort((a, b) => gravity(b.finding) - gravity(a.finding) || a.index - b.index)
    .map(({ finding }) => finding);
}

/** A finding's sentence in the reader's units, where it comes with its numbers. */
export function sentenceOf(finding: Finding, system: UnitSystem): string {
  const { sentenceTemplate, values } = finding;
  return sentenceTemplate && values ? sayFinding({ sentenceTemplate, values }, system) : finding.sentence;
}
