import { and, asc, eq, sql } from "drizzle-orm";
import { adminDb } from "@/db/client";
import { memberships, organisations, users } from "@/db/schema";
import type { Role } from "@/lib/access/permissions";

export type PersonRow = typeof users.$inferSelect;

export interface MembershipRow {
  organisationId: string;
  slug: string;
  organisationName: string;
  isDemo: boolean;
  role: Role;
}

/** The person with this address, whatever its case; before sign-in no organisation is known. */
export async function findPersonByEmail(email: string): Promise<PersonRow | null> {
  const [row] = await adminDb().select().from(users).where(eq(users.email, email.trim().toLowerCase()));
  return row ?? null;
}

export async function findPersonById(userId: string): Promise<PersonRow | null> {
  const [row] = await adminDb().select().from(users).where(eq(users.id, userId));
  return row ?? null;
}

/** Every organisation of this person, the oldest membership first. */
export async function listMembershipsOfPerson(userId: string): Promise<MembershipRow[]> {
  const rows = await adminDb()
    .select({
      organisationId: organisations.id,
      slug: organisations.slug,
      organisationName: organisations.name,
      isDemo: organisations.isDemo,
      role: memberships.role,
    })
    .from(memberships)
    .innerJoin(organisations, eq(organisations.id, memberships.organisationId))
    .where(eq(memberships.userId, userId))
    .orderBy(asc(memberships.createdAt), asc(memberships.id));
  return rows.map((row) => ({ ...row, isDemo: row.isDemo === "yes" }));
}

export async function updatePerson(
  userId: string,
  changes: Partial<
    Pick<PersonRow, "name" | "unitSystem" | "unitPreferences" | "contrast" | "passwordHash" | "sessionSalt">
  >,
): Promise<void> {
  await adminDb().update(users).set(changes).where(eq(users.id, userId));
}

/** Notes that this session was signed out; forgets those that have run out by themselves. */
export async function recordEndedSession(
  userId: string,
  input: { sessionId: string; until: Date; now: Date },
): Promise<void> {
  const ended = JSON.stringify([{ id: input.sessionId, until: input.until.toISOString() }]);
  const living = sql`(select coalesce(jsonb_agg(entry), '[]') from jsonb_array_elements(${users.endedSessions}) entry
    where (entry->>'until')::timestamptz > ${input.now.toISOString()}::timestamptz)`;
  await adminDb()
    .update(users)
    .set({ endedSessions: sql`${living} || ${ended}::jsonb` })
    .where(eq(users.id, userId));
}

/** The person with this address, made when there is none. `created` tells the two apart. */
export async function findOrCreatePerson(
  person: Pick<PersonRow, "id" | "email" | "name" | "passwordHash">,
): Promise<{ person: PersonRow; created: boolean }> {
  const email = person.email.trim().toLowerCase();
  const [made] = await adminDb()
    .insert(users)
    .values({ ...person, email })
    .onConflictDoNothing({ target: users.email })
    .returning();
  if (made) return { person: made, created: true };
  const known = await findPersonByEmail(email);
  if (!known) throw new Error(`findOrCreatePerson found no person after a conflict on ${email}`);
  return { person: known, created: false };
}

/** One membership, looked up at every request so that a changed role takes effect at once. */
export async function findRole(userId: string, organisationId: string): Promise<Role | null> {
  const [row] = await adminDb()
    .select({ role: memberships.role })
    .from(memberships)
    .where(and(eq(memberships.userId, userId), eq(memberships.organisationId, organisationId)));
  return row?.role ?? null;
}
