import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { getShare, listShares as listShareRows, revokeShareRow } from "@/db/queries/shares";
import { AppError } from "@/lib/errors";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Share } from "@/lib/schemas/shares";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";
import { describeShare } from "@/lib/server/shares/describe-share";

export async function listShares(container: Container, scope: Scope, query: ListQuery & { fieldId: string }) {
  const { rows, nextCursor } = await withOrganisation(scope, async (tx) => {
    await getFieldOrThrow(tx, scope, query.fieldId);
    return listShareRows(tx, scope, query);
  });
  const now = container.clock.now();
  return { items: rows.map((row) => describeShare(row, now)), nextCursor };
}

/** @throws AppError `not_found` */
export async function readShare(container: Container, scope: Scope, shareId: string): Promise<Share> {
  const row = await withOrganisation(scope, (tx) => getShare(tx, scope, shareId));
  if (!row) throw new AppError("not_found", "There is no such share.");
  return describeShare(row, container.clock.now());
}

/** Ends a share at once; ending it again is fine. @throws AppError `not_found` */
export async function revokeShare(container: Container, scope: Scope, shareId: string): Promise<void> {
  await withOrganisation(scope, async (tx) => {
    const share = await getShare(tx, scope, shareId);
    if (!share) throw new AppError("not_found", "There is no such share.");
    if (share.revokedAt) return;
    await revokeShareRow(tx, scope, { shareId, at: container.clock.now() });
    const { name } = await getFieldOrThrow(tx, scope, share.fieldId);
    const { fieldId, audience } = share;
    await recordAudit(tx, scope, { action: "share.revoke", subject: shareId, detail: { name, fieldId, audience } });
  });
}
