import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { findPersonById, recordEndedSession, updatePerson } from "@/db/queries/system/people";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";
import { forgetAccess } from "@/lib/server/access/recent-access";
import { newSessionSalt, sessionStamp } from "@/lib/server/access/secrets";
import type { Container } from "@/lib/server/container";

/** Ends one sign-in, on every copy of its cookie, before its time. Others of the same person go on. */
export async function endSession(
  container: Container,
  session: { userId: string; sessionId: string; livesS: number },
): Promise<void> {
  const now = container.clock.now();
  // A renewed cookie lives that long from its renewal at most, and none is renewed from here on.
  const until = new Date(now.getTime() + session.livesS * 1000);
  await recordEndedSession(session.userId, { sessionId: session.sessionId, until, now });
  forgetAccess();
}

/** Ends every session of the person. Answers the stamp that the caller's own needs to go on. */
export async function endAllSessions(_container: Container, scope: Scope): Promise<{ stamp: string }> {
  const person = await findPersonById(scope.userId);
  if (!person) throw new AppError("unauthorized", "This account is gone.");
  const sessionSalt = newSessionSalt();
  await updatePerson(person.id, { sessionSalt });
  await withOrganisation(scope, (tx) =>
    recordAudit(tx, scope, { action: "session.end", subject: person.id, detail: { name: person.name } }),
  );
  return { stamp: sessionStamp({ passwordHash: person.passwordHash, sessionSalt }) };
}
