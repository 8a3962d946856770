import { request } from "node:http";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startTestServer, type TestServer } from "@/tests/support/server";

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer({ seed: false });
});
afterAll(async () => server?.close());

interface Answer {
  status: number;
  type: string;
  text: string;
  cookies: string[];
  location: string | undefined;
}

/** A request as it stands: `fetch` would put addresses right before they leave. */
function ask(
  path: string,
  options: { cookie?: string; method?: string; body?: string; type?: string } = {},
): Promise<Answer> {
  const { hostname, port } = new URL(server.baseUrl);
  const headers = {
    ...(options.cookie ? { cookie: options.cookie } : {}),
    ...(options.body === undefined ? {} : { "content-type": options.type ?? "application/json" }),
  };
  return new Promise((resolve, reject) => {
    const asked = request({ hostname, port, path, method: options.method ?? "GET", headers }, (response) => {
      const chunks: Buffer[] = [];
      response.on("data", (chunk: Buffer) => chunks.push(chunk));
      response.on("end", () =>
        resolve({
          status: response.statusCode ?? 0,
          type: response.headers["content-type"] ?? "",
          text: Buffer.concat(chunks).toString("utf8"),
          cookies: response.headers["set-cookie"] ?? [],
          location: response.headers.location,
        }),
      );
    });
    asked.on("error", reject).end(options.body);
  });
}

async function firstFieldId(cookie: string): Promise<string> {
  const made = await ask("/api/v1/fields", { cookie, method: "POST", body: JSON.stringify({ name: "Refusals" }) });
  return String((JSON.parse(made.text) as { id: string }).id);
}

describe("addresses that cannot be decoded", () => {
  it.each(["/s/%ff", "/larkspur-flats/fields/%ff", "/%ff", "/_next/static/%ff"])(
    "%s is a page that says 400",
    async (path) => {
      const answer = await ask(path);
      expect([answer.status, answer.type]).toEqual([400, "text/html; charset=utf-8"]);
    },
  );

  it("is a problem under /api", async () => {
    const answer = await ask("/api/v1/fields/%ff");
    expect([answer.status, answer.type]).toEqual([400, "application/problem+json"]);
  });

  it("is 414 when it has no end", async () => {
    expect((await ask(`/api/v1/fields?cursor=${"a".repeat(12_000)}`)).status).toBe(414);
  });
});

describe("signing in with what cannot be read", () => {
  it("overlooks an unreadable return cookie and takes it away", async () => {
    for (const value of ["nonsense", "http://"]) {
      const answer = await ask("/api/auth/csrf", { cookie: `next-auth.callback-url=${value}` });
      expect(answer.status).toBe(200);
      expect(answer.cookies.join("\n")).toMatch(/next-auth\.callback-url=; .*Max-Age=0/);
    }
    expect(
      (await ask("/api/auth/session", { cookie: "next-auth.csrf-token=%7C; next-auth.session-token=%ff" })).status,
    ).toBe(200);
  });

  it("sends on, to the sign-in page and not to an error of ours", async () => {
    const answer = await ask("/api/auth/signin?callbackUrl=http%3A%2F%2F");
    expect(answer.status).toBe(302);
    expect(answer.location).not.toContain("Configuration");
  });

  it("answers 400 to a body that is no form", async () => {
    for (const action of ["callback/credentials", "signout", "_log"]) {
      expect((await ask(`/api/auth/${action}`, { method: "POST", body: "{bad" })).status, action).toBe(400);
    }
  });
});

describe("pages say in their status what they are", () => {
  it("403 where the role bars, 404 where nothing is", async () => {
    const operator = await server.signIn("operator@larkspur.example");
    const fieldId = await firstFieldId(await server.signIn("owner@larkspur.example"));
    const field = `/larkspur-flats/fields/${fieldId}`;
    for (const path of [
      "/larkspur-flats/people",
      "/larkspur-flats/settings/audit",
      "/larkspur-flats/machines/new",
      `${field}/share`,
    ]) {
      expect((await ask(path, { cookie: operator })).status, path).toBe(403);
    }
    const absent = ["/larkspur-flats/fields/fld_none/rows", "/larkspur-flats/machines/mac_none", "/otherfarm/fields"];
    for (const path of [
      ...absent,
      `${field}/logs/log_none`,
      `${field}/logs/log_none/columns`,
      `${field}/rows?log=log_none`,
    ]) {
      expect((await ask(path, { cookie: operator })).status, path).toBe(404);
    }
    expect((await ask(`${field}/logs`, { cookie: operator })).status).toBe(200);
  });

  it("404 for a link that opens nothing, 401 for one that asks for a passcode", async () => {
    const owner = await server.signIn("owner@larkspur.example");
    const fieldId = await firstFieldId(owner);
    const share = async (extra: object) => {
      const expiresAt = new Date(Date.now() + 86_400_000).toISOString();
      const body = JSON.stringify({ audience: "landowner", layers: ["boundary"], expiresAt, ...extra });
      const made = await ask(`/api/v1/fields/${fieldId}/shares`, { cookie: owner, method: "POST", body });
      return JSON.parse(made.text) as { id: string; url: string };
    };
    const open = await share({});
    const path = new URL(open.url).pathname;
    expect((await ask(path)).status).toBe(200);
    await ask(`/api/v1/shares/${open.id}`, { cookie: owner, method: "DELETE" });
    expect((await ask(path)).status).toBe(404);
    expect((await ask("/s/nothing-of-the-kind")).status).toBe(404);
    expect((await ask(new URL((await share({ passcode: "stubble" })).url).pathname)).status).toBe(401);
  });
});

describe("signing out", () => {
  it("ends every copy of that session's cookie, and no other session", async () => {
    const [one, other] = [
      await server.signIn("viewer@larkspur.example"),
      await server.signIn("viewer@larkspur.example"),
    ];
    const csrf = await ask("/api/auth/csrf", { cookie: one });
    const { csrfToken } = JSON.parse(csrf.text) as { csrfToken: string };
    const form = new URLSearchParams({ csrfToken, callbackUrl: "/" }).toString();
    const type = "application/x-www-form-urlencoded";
    expect((await ask("/api/v1/me", { cookie: one })).status).toBe(200);
    await ask("/api/auth/signout", { cookie: one, method: "POST", body: form, type });
    expect((await ask("/api/v1/me", { cookie: one })).status).toBe(401);
    expect((await ask("/api/auth/session", { cookie: one })).text).toBe("{}");
    expect((await ask("/api/v1/me", { cookie: other })).status).toBe(200);
  });

  it("everywhere ends all of them but the one that asks", async () => {
    const [one, other] = [
      await server.signIn("viewer@larkspur.example"),
      await server.signIn("viewer@larkspur.example"),
    ];
    const answer = await ask("/api/v1/me/sessions", { cookie: one, method: "DELETE" });
    expect(answer.status).toBe(204);
    const renewed = answer.cookies.map((line) => line.split(";")[0]).join("; ");
    expect((await ask("/api/v1/me", { cookie: other })).status).toBe(401);
    expect((await ask("/api/v1/me", { cookie: one })).status).toBe(401);
    expect((await ask("/api/v1/me", { cookie: renewed })).status).toBe(200);
  });
});
