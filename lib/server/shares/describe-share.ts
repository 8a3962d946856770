import "server-only";
import type { ShareRow } from "@/db/queries/shares";
import type { Share } from "@/lib/schemas/shares";
import { shareState } from "@/lib/sharing/share-state";

/** A share as the API shows it: never its token, which is not kept. */
export function describeShare(row: ShareRow, now: Date): Share {
  return {
    id: row.id,
    fieldId: row.fieldId,
    logId: row.logId,
    audience: row.audience,
    layers: row.layers,
    expiresAt: row.expiresAt.toISOString(),
    revokedAt: row.revokedAt?.toISOString() ?? null,
    hasPasscode: row.passcodeHash !== null,
    allowDownload: row.allowDownload,
    blurLocation: row.blurLocation,
    createdAt: row.createdAt.toISOString(),
    openedCount: row.openedCount,
    lastOpenedAt: row.lastOpenedAt?.toISOString() ?? null,
    state: shareState(row, now),
  };
}
