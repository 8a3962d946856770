import type { Finding } from "@/lib/schemas/logs";

/** About the data or the machine's description, not about the field: for those who keep them. */
const HOUSEKEEPING: ReadonlySet<string> = new Set(["cannot-judge", "weight-unknown", "readings-doubtful"]);
const MAX_FOR_LANDOWNER = 3;
const GRAVITY: Record<Finding["severity"], number> = { act: 0, look: 1, ok: 2 };

/**
 * What a reader of a share link gets to read. A landowner gets the at most three gravest findings about the field, without
 * what the log cannot tell or what the machine's description lacks; everybody else gets all. Equals keep their order.
 */
export function findingsForReader<T extends Pick<Finding, "kind" | "severity">>(
  findings: readonly T[],
  audience: string,
): T[] {
  if (audience !== "landowner") return [...findings];
  return findings
    .filter(({ kind }) => !HOUSEKEEPING.has(kind))
    .sort((a, b) => GRAVITY[a.severity] - GRAVITY[b.severity])
    .slice(0, MAX_FOR_LANDOWNER);
}
