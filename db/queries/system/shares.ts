import { and, eq, sql } from "drizzle-orm";
import { adminDb } from "@/db/client";
import { shares } from "@/db/schema";

export type ShareRow = typeof shares.$inferSelect;

/** The share with this SHA-256 of its token, also when expired or revoked: the caller decides what to say. */
export async function findShareByTokenHash(tokenHash: string): Promise<ShareRow | null> {
  const [row] = await adminDb().select().from(shares).where(eq(shares.tokenHash, tokenHash));
  return row ?? null;
}

export async function recordShareOpening(share: Pick<ShareRow, "organisationId" | "id">, at: Date): Promise<void> {
  await adminDb()
    .update(shares)
    .set({ openedCount: sql`${shares.openedCount} + 1`, lastOpenedAt: at })
    .where(and(eq(shares.organisationId, share.organisationId), eq(shares.id, share.id)));
}
