import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import type { TestServer } from "@/tests/support/server";

export const OWNER = { email: "owner@larkspur.example", password: DEMO_PASSWORD };
const ROOT = "/larkspur-flats";

/** An application with the demo farm in it. */
export type DemoServer = Pick<TestServer, "baseUrl" | "signIn">;

/** A screen of the application with something on it. */
export interface Screen {
  name: string;
  path: string;
  /** Shown to somebody without an account. */
  isPublic?: boolean;
}

interface Item {
  id: string;
  name: string;
  kind?: string;
}

/** The demo farm over the API, as its owner. */
export async function askAsOwner(server: DemoServer) {
  const cookie = await server.signIn(OWNER.email);
  return async (path: string, body?: unknown): Promise<Record<string, unknown>> => {
    const response = await fetch(`${server.baseUrl}/api/v1${path}`, {
      method: body === undefined ? "GET" : "POST",
      headers: { cookie, "content-type": "application/json" },
      body: body === undefined ? undefined : JSON.stringify(body),
    });
    if (!response.ok) throw new Error(`${path}: ${response.status} ${await response.text()}`);
    return (await response.json()) as Record<string, unknown>;
  };
}

type Ask = Awaited<ReturnType<typeof askAsOwner>>;

async function makeShare(ask: Ask, fieldId: string, logId: string, passcode?: string): Promise<string> {
  const share = await ask(`/fields/${fieldId}/shares`, {
    audience: "landowner",
    layers: ["boundary", "verdict", "coverage", "margin"],
    logId,
    expiresAt: new Date(Date.now() + 86_400_000).toISOString(),
    ...(passcode === undefined ? {} : { passcode }),
  });
  return new URL(String(share.url)).pathname;
}

/** Every screen there is, on the demo's field with most on it; makes two links to share. */
export async function listScreens(server: DemoServer): Promise<Screen[]> {
  const ask = await askAsOwner(server);
  const fields = (await ask("/fields")).items as Item[];
  const east = fields.find(({ name }) => name === "East quarter")!;
  const logs = (await ask(`/fields/${east.id}/logs`)).items as Item[];
  const log = logs.find(({ kind }) => kind === "seeding")!;
  const machines = (await ask("/machines")).items as Item[];
  const field = `${ROOT}/fields/${east.id}`;
  const book = `${field}/logs/${log.id}`;
  return [
    { name: "front", path: "/", isPublic: true },
    { name: "sign-in", path: "/sign-in", isPublic: true },
    { name: "api-reference", path: "/docs/api", isPublic: true },
    { name: "share", path: await makeShare(ask, east.id, log.id), isPublic: true },
    { name: "share-passcode", path: await makeShare(ask, east.id, log.id, "stubble-24"), isPublic: true },
    { name: "share-gone", path: "/s/nothing-of-the-kind", isPublic: true },
    { name: "fields", path: `${ROOT}/fields` },
    { name: "field-new", path: `${ROOT}/fields/new` },
    { name: "rows", path: `${field}/rows?log=${log.id}&channel=margin` },
    { name: "logs", path: `${field}/logs` },
    { name: "log", path: book },
    { name: "columns", path: `${book}/columns` },
    { name: "cleaning", path: `${book}/cleaning` },
    { name: "links", path: `${field}/share` },
    { name: "about", path: `${field}/settings` },
    { name: "machines", path: `${ROOT}/machines` },
    { name: "machine", path: `${ROOT}/machines/${machines[0]!.id}` },
    { name: "machine-new", path: `${ROOT}/machines/new?kind=seeder` },
    { name: "people", path: `${ROOT}/people` },
    { name: "recipes", path: `${ROOT}/recipes` },
    { name: "settings", path: `${ROOT}/settings` },
    { name: "audit", path: `${ROOT}/settings/audit` },
    { name: "not-here", path: `${ROOT}/fields/nothing-of-the-kind/rows` },
  ];
}
