import { and, eq } from "drizzle-orm";
import { adminDb } from "@/db/client";
import { tokens } from "@/db/schema";

export type TokenRow = typeof tokens.$inferSelect;

/** The personal token with this SHA-256; its organisation is known only afterwards. */
export async function findTokenByHash(tokenHash: string): Promise<TokenRow | null> {
  const [row] = await adminDb().select().from(tokens).where(eq(tokens.tokenHash, tokenHash));
  return row ?? null;
}

export async function recordTokenUse(token: Pick<TokenRow, "organisationId" | "id">, at: Date): Promise<void> {
  await adminDb()
    .update(tokens)
    .set({ lastUsedAt: at })
    .where(and(eq(tokens.organisationId, token.organisationId), eq(tokens.id, token.id)));
}
