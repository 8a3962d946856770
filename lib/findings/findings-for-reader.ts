import { sayPlainly } from "@/lib/findings/say-plainly";
import type { Finding } from "@/lib/schemas/logs";

/** About the data or the machine's description, not about the field: for those who keep them. */
const HOUSEKEEPING: ReadonlySet<string> = new Set(["cannot-judge", "weight-unknown", "readings-doubtful"]);
const MAX_FOR_LANDOWNER = 3;
const GRAVITY: Record<Finding["severity"], number> = { act: 0, look: 1, ok: 2 };

type Readable = Pick<Finding, "kind" | "severity" | "sentence" | "sentenceTemplate" | "check">;

function inPlainWords<T extends Readable>(finding: T): T {
  const { sentence, sentenceTemplate, check } = finding;
  const template = sentenceTemplate === undefined ? {} : { sentenceTemplate: sayPlainly(sentenceTemplate) };
  return { ...finding, ...template, sentence: sayPlainly(sentence), check: sayPlainly(check) };
}

/**
 * What a reader of a share link gets to read. A landowner gets the at most three gravest findings about the field, in plain
 * words, without what the log cannot tell or what the machine's description lacks; everybody else gets all, as they stand.
 * Equals keep their order.
 */
export function findingsForReader<T extends Readable>(findings: readonly T[], audience: string): T[] {
  if (audience !== "landowner") return [...findings];
  return findings
    .filter(({ kind }) => !HOUSEKEEPING.has(kind))
    .sort((a, b) => GRAVITY[a.severity] - GRAVITY[b.severity])
    .slice(0, MAX_FOR_LANDOWNER)
    .map((finding) => inPlainWords(finding));
}
