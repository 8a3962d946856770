import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { Problem } from "@/lib/schemas/problem";
import { callApi, type ApiCall } from "@/tests/support/call-api";
import { makeWorld, type World } from "@/tests/support/make-world";

let world: World;
beforeAll(async () => {
  world = await makeWorld();
});
afterAll(async () => world.close());

async function problemOf(response: Response) {
  expect(response.headers.get("content-type")).toBe("application/problem+json");
  const problem = Problem.parse(await response.json());
  expect(problem.status).toBe(response.status);
  return problem;
}

async function countFields(): Promise<number> {
  const page = await world.read("owner", { path: "/api/v1/fields?limit=500" });
  return (page.items as unknown[]).length;
}

describe("errors", () => {
  it("answers an unknown address with a 404 problem", async () => {
    const response = await world.as("owner", { path: "/api/v1/nothing/here" });
    expect((await problemOf(response)).code).toBe("not_found");
    expect(response.status).toBe(404);
  });

  it("answers a method an address does not take with a 405 problem that names those it does", async () => {
    const response = await world.as("owner", { method: "DELETE", path: "/api/v1/fields" });
    expect(response.status).toBe(405);
    expect((await problemOf(response)).code).toBe("method_not_allowed");
    expect(response.headers.get("allow")).toBe("GET, POST");
  });

  const bodies: [string, Partial<ApiCall>, number, string][] = [
    ["malformed JSON", { body: '{"name":' }, 400, "malformed_json"],
    ["no body", {}, 415, "unsupported_body"],
    ["an empty JSON body", { headers: { "content-type": "application/json" } }, 400, "malformed_json"],
    ["another type", { body: "name=x", headers: { "content-type": "text/plain" } }, 415, "unsupported_body"],
    ["a list", { body: [] }, 422, "unprocessable"],
    ["NUL in a name", { body: { name: "a\u0000b" } }, 422, "unprocessable"],
    ["half a surrogate pair", { body: '{"name":"\\ud800"}' }, 422, "unprocessable"],
    ["endless nesting", { body: `{"name":${"[".repeat(200_000)}${"]".repeat(200_000)}}` }, 422, "unprocessable"],
    ["too much", { body: { name: "x".repeat(6 * 1024 * 1024) } }, 413, "too_large"],
    ["a value out of range", { body: { name: "x", boundary: { type: "Point" } } }, 422, "unprocessable"],
  ];
  it.each(bodies)("refuses %s", async (_name, call, status, code) => {
    const response = await world.as("owner", { method: "POST", path: "/api/v1/fields", ...call });
    expect({ status: response.status, code: (await problemOf(response)).code }).toEqual({ status, code });
  });

  it("treats an id that no database could hold as absent", async () => {
    await world.read("owner", { path: "/api/v1/fields/%00", expect: 404 });
    await world.read("owner", { path: `/api/v1/fields/${encodeURIComponent("' or 1=1 --")}`, expect: 404 });
  });

  it("keeps what it did not foresee to itself", async () => {
    const broken = {
      ...world.container,
      clock: {
        now: () => {
          throw new Error("secret detail");
        },
      },
    };
    const { replaceContainer } = await import("@/app/_server/container");
    replaceContainer(broken);
    try {
      const response = await world.as("owner", { method: "POST", path: "/api/v1/tokens", body: { name: "t" } });
      const problem = await problemOf(response);
      expect(response.status).toBe(500);
      expect(JSON.stringify(problem)).not.toContain("secret detail");
      expect(problem.detail).toMatch(/quote [0-9a-f]{12}/);
    } finally {
      replaceContainer(world.container);
    }
  });
});

describe("who asks", () => {
  it("wants a session or a token", async () => {
    for (const call of [
      {},
      { cookie: "next-auth.session-token=forged" },
      { token: "cbk_unknown" },
      { headers: { authorization: "Basic x" } },
    ]) {
      const response = await callApi({ path: "/api/v1/fields", ...call });
      expect(response.status).toBe(401);
      expect(response.headers.get("www-authenticate")).toBe("Bearer");
    }
  });

  const foreign: [string, Record<string, string>, number][] = [
    ["the page itself", { origin: "http://localhost:3000", "sec-fetch-site": "same-origin" }, 201],
    ["a script without a browser", {}, 201],
    ["another site", { origin: "https://evil.example", "sec-fetch-site": "cross-site" }, 403],
    ["a sister site", { "sec-fetch-site": "same-site" }, 403],
    ["an old browser elsewhere", { origin: "https://evil.example" }, 403],
    ["a sandboxed frame", { origin: "null" }, 403],
  ];
  it.each(foreign)("checks the origin of a change: %s", async (_name, headers, status) => {
    const call = { method: "POST", path: "/api/v1/fields", body: { name: "Origin" }, headers };
    expect((await world.as("owner", call)).status).toBe(status);
  });

  it("needs no origin from a token, which no browser sends by itself", async () => {
    const { token } = await world.read("owner", { method: "POST", path: "/api/v1/tokens", body: { name: "script" } });
    const headers = { origin: "https://notebook.example", "sec-fetch-site": "cross-site" };
    const call = { method: "POST", path: "/api/v1/fields", body: { name: "By token" }, headers };
    expect((await callApi({ ...call, token: String(token) })).status).toBe(201);
  });

  it("acts in the organisation that the request names, and in no other's", async () => {
    await world.read("owner", { path: "/api/v1/fields", headers: { "x-organisation": "larkspur-flats" }, expect: 200 });
    await world.read("owner", { path: "/api/v1/fields", headers: { "x-organisation": "otherfarm" }, expect: 404 });
  });
});

describe("Idempotency-Key", () => {
  const post = (key: string, body: unknown): ApiCall => ({
    method: "POST",
    path: "/api/v1/fields",
    headers: { "idempotency-key": key },
    body,
  });

  it("makes one thing of two requests and gives the same reply", async () => {
    const before = await countFields();
    const [first, second] = [
      await world.as("owner", post("k1", { name: "Once" })),
      await world.as("owner", post("k1", { name: "Once" })),
    ];
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(await second.text()).toBe(await first.text());
    expect(second.headers.get("location")).toBe(first.headers.get("location"));
    expect(await countFields()).toBe(before + 1);
  });

  it("makes one thing of many at once", async () => {
    const before = await countFields();
    const replies = await Promise.all(
      Array.from({ length: 6 }, () => world.as("owner", post("k2", { name: "At once" }))),
    );
    const bodies = await Promise.all(replies.map((reply) => reply.text()));
    expect(replies.map((reply) => reply.status)).toEqual([201, 201, 201, 201, 201, 201]);
    expect(new Set(bodies).size).toBe(1);
    expect(await countFields()).toBe(before + 1);
  });

  it("refuses the same key with another body", async () => {
    await world.read("owner", { ...post("k3", { name: "One" }), expect: 201 });
    const problem = await world.read("owner", { ...post("k3", { name: "Two" }), expect: 422 });
    expect(problem.code).toBe("idempotency_key_reused");
  });

  it("tries again after a failure, and keeps people apart", async () => {
    await world.read("owner", { ...post("k4", { name: "" }), expect: 422 });
    const owned = await world.read("owner", { ...post("k4", { name: "Right" }), expect: 201 });
    const other = await world.read("agronomist", { ...post("k4", { name: "Right" }), expect: 201 });
    expect(other.id).not.toBe(owned.id);
  });

  it("keeps a secret shown once out of the database", async () => {
    const call = { ...post("k5", { name: "sealed" }), path: "/api/v1/tokens" };
    const { token } = await world.read("owner", call);
    expect((await world.read("owner", call)).token).toBe(token);
    const { adminDb } = await import("@/db/client");
    const { rows } = await adminDb().$client.query("select * from idempotency_keys");
    const { rows: tokens } = await adminDb().$client.query("select * from tokens");
    expect(JSON.stringify([rows, tokens])).not.toContain(String(token));
    expect(JSON.stringify(rows)).not.toContain('"k5"');
  });
});

describe("health", () => {
  it("says the process is up to anybody", async () => {
    expect(await world.read("stranger", { path: "/api/health" })).toEqual({ status: "up" });
  });

  it("names the service that does not answer", async () => {
    expect(await world.read("stranger", { path: "/api/ready" })).toMatchObject({
      status: "ready",
      database: "answers",
    });
    const { replaceContainer } = await import("@/app/_server/container");
    const storage = {
      ...world.container.storage,
      ping: async () => {
        throw new Error("refused");
      },
    };
    replaceContainer({ ...world.container, storage });
    const reply = await world.read("stranger", { path: "/api/ready", expect: 503 });
    replaceContainer(world.container);
    expect(reply).toEqual({ status: "not-ready", database: "answers", queue: "answers", storage: "silent" });
  });
});
