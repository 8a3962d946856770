import "server-only";
import { cookies } from "next/headers";
import { forbidden, notFound, redirect } from "next/navigation";
import { cache } from "react";
import { container } from "@/app/_server/container";
import { readSessionClaims, sessionCookieName } from "@/app/_server/session-cookie";
import type { PersonRow } from "@/db/queries/system/people";
import { can, type Permission } from "@/lib/access/permissions";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";
import { authenticateSession, type Identity } from "@/lib/server/access/authenticate";
import { chooseOrganisation } from "@/lib/server/access/choose-organisation";

export interface PageScope {
  scope: Scope;
  organisation: { id: string; slug: string; name: string; isDemo: boolean };
  user: Pick<PersonRow, "id" | "name" | "email" | "unitSystem" | "unitPreferences" | "contrast">;
}

/** Who looks at this page; null when nobody is signed in. One look-up a request. */
export const currentIdentity = cache(async (): Promise<Identity | null> => {
  const { env } = container();
  const cookie = (await cookies()).get(sessionCookieName(env.baseUrl))?.value;
  const claims = await readSessionClaims(cookie, env.AUTH_SECRET);
  return claims ? authenticateSession(claims) : null;
});

async function pageScope(identity: Identity, organisationSlug: string | null): Promise<PageScope> {
  const { scope, membership } = await chooseOrganisation(identity, { demanded: organisationSlug });
  const { id, name, email, unitSystem, unitPreferences, contrast } = identity.person;
  return {
    scope,
    organisation: {
      id: membership.organisationId,
      slug: membership.slug,
      name: membership.organisationName,
      isDemo: membership.isDemo,
    },
    user: { id, name, email, unitSystem, unitPreferences, contrast },
  };
}

async function findScope(organisationSlug: string): Promise<PageScope> {
  const identity = await currentIdentity();
  if (!identity) redirect("/sign-in");
  try {
    return await pageScope(identity, organisationSlug);
  } catch (error) {
    if (error instanceof AppError) notFound();
    throw error;
  }
}

/**
 * For pages under `/[org]`: the person's scope there. Sends strangers to sign-in; other organisations do not exist (404);
 * a page whose permission the role lacks is refused (403).
 */
export async function requireScope(organisationSlug: string, permission?: Permission): Promise<PageScope> {
  const found = await findScope(organisationSlug);
  if (permission && !can(found.scope.role, permission)) forbidden();
  return found;
}

/** What a page shows, or the page that says it is not here: absent, another organisation's, and not given read the same. */
export async function orNotFound<Value>(reading: Promise<Value>): Promise<Value> {
  try {
    return await reading;
  } catch (error) {
    if (error instanceof AppError && error.code === "not_found") notFound();
    throw error;
  }
}

/** For the front page: the signed-in person's first organisation, or null. */
export async function currentScope(): Promise<PageScope | null> {
  const identity = await currentIdentity();
  if (!identity) return null;
  return pageScope(identity, null).catch((error: unknown) => {
    if (error instanceof AppError) return null;
    throw error;
  });
}
