import { replaceContainer } from "@/app/_server/container";
import { newSessionCookie } from "@/app/_server/session-cookie";
import { findPersonByEmail } from "@/db/queries/system/people";
import { seedOrganisations } from "@/db/seed/organisations";
import type { Role } from "@/lib/access/permissions";
import { sessionStamp } from "@/lib/server/access/secrets";
import { callApi, type ApiCall } from "@/tests/support/call-api";
import { makeContainer, type TestContainer } from "@/tests/support/make-container";
import { createTestDatabase } from "@/tests/support/test-db";

export type Actor = Role | "stranger" | "other-owner";

export interface World {
  container: TestContainer;
  cookies: Record<Exclude<Actor, "stranger">, string>;
  /** Sends a request as one of the demo people. */
  as: (actor: Actor, call: ApiCall) => Promise<Response>;
  /** The same, its JSON read; fails the test on another status. */
  read: (actor: Actor, call: ApiCall & { expect?: number }) => Promise<Record<string, unknown>>;
  /** Goes on with the session that a reply opened, as a browser does. */
  keepCookie: (actor: Exclude<Actor, "stranger">, response: Response) => void;
  close: () => Promise<void>;
}

const EMAILS: Record<Exclude<Actor, "stranger">, string> = {
  owner: "owner@larkspur.example",
  agronomist: "agronomist@larkspur.example",
  researcher: "researcher@larkspur.example",
  operator: "operator@larkspur.example",
  viewer: "viewer@larkspur.example",
  "other-owner": "owner@otherfarm.example",
};

/** The session cookie of a person, as a browser sends it back. */
export async function sessionCookieOf(email: string, container: Pick<TestContainer, "env">): Promise<string> {
  const person = await findPersonByEmail(email);
  if (!person) throw new Error(`nobody has the address ${email}`);
  const claims = { userId: person.id, stamp: sessionStamp(person) };
  const { AUTH_SECRET: secret, baseUrl } = container.env;
  return (await newSessionCookie(claims, { secret, baseUrl })).split(";")[0]!;
}

/** A fresh database with the demo organisations, an in-memory outside world, and everybody signed in. */
export async function makeWorld(): Promise<World> {
  const database = await createTestDatabase();
  await seedOrganisations();
  const container = makeContainer();
  replaceContainer(container);
  const entries = await Promise.all(
    Object.entries(EMAILS).map(async ([actor, email]) => [actor, await sessionCookieOf(email, container)] as const),
  );
  const cookies = Object.fromEntries(entries) as World["cookies"];
  const as: World["as"] = (actor, call) =>
    callApi(actor === "stranger" ? call : { ...call, cookie: call.cookie ?? cookies[actor] });
  return {
    container,
    cookies,
    as,
    read: async (actor, { expect: wanted, ...call }) => {
      const response = await as(actor, call);
      const text = await response.text();
      const isExpected = wanted === undefined ? response.ok : response.status === wanted;
      if (!isExpected) throw new Error(`${call.method ?? "GET"} ${call.path}: ${response.status} ${text}`);
      return text ? (JSON.parse(text) as Record<string, unknown>) : {};
    },
    keepCookie: (actor, response) => {
      const [line] = response.headers.getSetCookie();
      if (line) cookies[actor] = line.split(";")[0]!;
    },
    close: async () => {
      replaceContainer(undefined);
      await database.drop();
    },
  };
}

/** A square kilometre at Larkspur Flats, its corners in degrees. */
export const SQUARE = {
  type: "Polygon",
  coordinates: [
    [
      [-98.01, 38.5],
      [-98.0, 38.5],
      [-98.0, 38.51],
      [-98.01, 38.51],
      [-98.01, 38.5],
    ],
  ],
};
