import { eq } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { organisations } from "@/db/schema";
import type { Scope } from "@/lib/scope";

export async function findOrganisationName(tx: Transaction, scope: Scope): Promise<string> {
  const [row] = await tx
    .select({ name: organisations.name })
    .from(organisations)
    .where(eq(organisations.id, scope.organisationId));
  if (!row) throw new Error(`organisation ${scope.organisationId} has gone`);
  return row.name;
}
