import "server-only";
import type { z } from "zod";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { deleteToken, insertToken, listTokens as listTokenRows } from "@/db/queries/tokens";
import type { TokenRow } from "@/db/queries/system/tokens";
import { isRoleWithin } from "@/lib/access/narrower-role";
import { AppError } from "@/lib/errors";
import { newId } from "@/lib/ids";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Token, TokenCreated, TokenInput } from "@/lib/schemas/people";
import type { Scope } from "@/lib/scope";
import { hashSecret, newPersonalToken } from "@/lib/server/access/secrets";
import type { Container } from "@/lib/server/container";

function describeToken(row: TokenRow): z.output<typeof Token> {
  return {
    id: row.id,
    name: row.name,
    role: row.role,
    createdAt: row.createdAt.toISOString(),
    expiresAt: row.expiresAt?.toISOString() ?? null,
    lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
  };
}

/** What ends with the token that asks ends the new one too, whether or not an end is given. */
function readExpiry(expiresAt: string | undefined, { now, latest }: { now: Date; latest: Date | null }): Date | null {
  if (expiresAt === undefined) return latest;
  const at = new Date(expiresAt);
  if (at <= now) {
    throw new AppError("unprocessable", "A token must expire in the future.", {
      places: [{ path: "expiresAt", message: "is not in the future" }],
    });
  }
  if (latest && at > latest) {
    throw new AppError("unprocessable", "A token made with a token cannot outlive it.", {
      places: [{ path: "expiresAt", message: `is after ${latest.toISOString()}, when the token that asks expires` }],
    });
  }
  return at;
}

/** A token of the caller's own, its role within theirs; made with a token, it may not outlive that one. The secret is in this reply and nowhere else. */
export async function createToken(
  container: Container,
  scope: Scope,
  input: z.output<typeof TokenInput> & { madeWith: Pick<TokenRow, "expiresAt"> | null },
): Promise<z.output<typeof TokenCreated>> {
  const role = input.role ?? scope.role;
  if (!isRoleWithin(role, scope.role)) {
    throw new AppError("unprocessable", `A token of a ${scope.role} cannot act as ${role}.`, {
      places: [{ path: "role", message: `may do what your role, ${scope.role}, may not` }],
    });
  }
  const now = container.clock.now();
  const secret = newPersonalToken();
  const expiresAt = readExpiry(input.expiresAt, { now, latest: input.madeWith?.expiresAt ?? null });
  const id = newId("token");
  const row = await withOrganisation(scope, async (tx) => {
    const values = { id, name: input.name, role, expiresAt, tokenHash: hashSecret(secret), createdAt: now };
    const made = await insertToken(tx, scope, values);
    await recordAudit(tx, scope, { action: "token.create", subject: id, detail: { name: input.name, role } });
    return made;
  });
  return { ...describeToken(row), token: secret };
}

export async function listTokens(_container: Container, scope: Scope, query: ListQuery) {
  const { rows, nextCursor } = await withOrganisation(scope, (tx) => listTokenRows(tx, scope, query));
  return { items: rows.map(describeToken), nextCursor };
}

/** @throws AppError `not_found` for another person's token too */
export async function revokeToken(_container: Container, scope: Scope, tokenId: string): Promise<void> {
  await withOrganisation(scope, async (tx) => {
    const name = await deleteToken(tx, scope, tokenId);
    if (name === null) throw new AppError("not_found", "There is no such token.");
    await recordAudit(tx, scope, { action: "token.revoke", subject: tokenId, detail: { name } });
  });
}
