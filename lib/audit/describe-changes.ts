/** Values as they were and as they became, of what changed and nothing else. */
export interface Changes {
  changed: string[];
  before: Record<string, unknown>;
  after: Record<string, unknown>;
}

/** Missing and null are the same: nothing there. */
function isSame(a: unknown, b: unknown): boolean {
  return JSON.stringify(a ?? null) === JSON.stringify(b ?? null);
}

/**
 * What a patch makes different, for the record of changes. Keys that the patch leaves undefined stayed as they were.
 * Never give it a secret.
 */
export function describeChanges(before: object, patch: object): Changes {
  const known: Record<string, unknown> = { ...before };
  const named = Object.entries(patch).filter(([key, value]) => value !== undefined && !isSame(known[key], value));
  return {
    changed: named.map(([key]) => key),
    before: Object.fromEntries(named.map(([key]) => [key, known[key] ?? null])),
    after: Object.fromEntries(named),
  };
}
