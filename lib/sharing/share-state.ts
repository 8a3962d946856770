/** Longest life of a share. */
export const LONGEST_SHARE_YEARS = 2;

/** Whether a link still opens. Revoked counts before expired. */
export function shareState(
  share: { expiresAt: Date; revokedAt: Date | null },
  now: Date,
): "open" | "expired" | "revoked" {
  if (share.revokedAt) return "revoked";
  return share.expiresAt <= now ? "expired" : "open";
}

/** The rule a wished end breaks, or null. */
export function findExpiryFault(expiresAt: Date, now: Date): string | null {
  const latest = new Date(now);
  latest.setUTCFullYear(latest.getUTCFullYear() + LONGEST_SHARE_YEARS);
  if (expiresAt <= now) return "must be in the future";
  return expiresAt > latest ? `must be within ${LONGEST_SHARE_YEARS} years` : null;
}
