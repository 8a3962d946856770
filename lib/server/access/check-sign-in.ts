import "server-only";
import { findPersonByEmail } from "@/db/queries/system/people";
import { isPasswordRight } from "@/lib/server/access/passwords";
import { sessionStamp } from "@/lib/server/access/secrets";

/** Longer ones cost the server time for nothing. */
const LONGEST_PASSWORD = 200;

/** The person whose email and password these are, or null; takes the same time whether or not the email is known. */
export async function checkSignIn(email: string, password: string): Promise<{ id: string; stamp: string } | null> {
  const person = await findPersonByEmail(email.slice(0, 320).replaceAll("\0", ""));
  const isRight = await isPasswordRight(password.slice(0, LONGEST_PASSWORD + 1), person?.passwordHash ?? null);
  return person && isRight ? { id: person.id, stamp: sessionStamp(person) } : null;
}
