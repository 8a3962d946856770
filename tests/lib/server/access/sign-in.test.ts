import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { limitSignIn } from "@/app/_server/limit-sign-in";
import { adminDb } from "@/db/client";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { checkSignIn } from "@/lib/server/access/check-sign-in";
import { hashPassword, isPasswordRight } from "@/lib/server/access/passwords";
import { openText, sealText } from "@/lib/server/access/seal-text";
import { makeWorld, type World } from "@/tests/support/make-world";

let world: World;
beforeAll(async () => {
  world = await makeWorld();
});
afterAll(async () => world.close());

describe("passwords", () => {
  it("are kept as argon2id with the parameters of OWASP's cheat sheet, salted", async () => {
    const [one, two] = await Promise.all([hashPassword("barley"), hashPassword("barley")]);
    expect(one).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    expect(one).not.toBe(two);
    expect(await isPasswordRight("barley", one)).toBe(true);
    expect(await isPasswordRight("Barley", one)).toBe(false);
  });

  it("of nobody are never right, not even the one checked in their place", async () => {
    expect(await isPasswordRight("a password that belongs to nobody", null)).toBe(false);
  });
});

describe("checkSignIn", () => {
  it("knows a person by email in any case, and by password exactly", async () => {
    expect(await checkSignIn(" Owner@Larkspur.example ", DEMO_PASSWORD)).toMatchObject({ id: "usr_larkspurowner" });
    expect(await checkSignIn("owner@larkspur.example", `${DEMO_PASSWORD} `)).toBeNull();
    expect(await checkSignIn("nobody@larkspur.example", DEMO_PASSWORD)).toBeNull();
    expect(await checkSignIn("owner\0@larkspur.example", "x".repeat(100_000))).toBeNull();
  });
});

describe("limitSignIn", () => {
  const attempt = (email: string, from: string, reply: () => Response) => {
    const body = new URLSearchParams({ email, password: "x" });
    const headers = { "x-forwarded-for": from };
    const request = new Request("http://localhost:3000/api/auth/callback/credentials", {
      method: "POST",
      body,
      headers,
    });
    return limitSignIn(request, async () => reply());
  };
  const wrong = () => new Response("{}", { status: 401 });
  const right = () =>
    new Response("{}", { headers: { "set-cookie": "next-auth.session-token=abc; Path=/; HttpOnly" } });

  it("stops the eleventh wrong attempt, whatever the case of the email, and says when to come back", async () => {
    for (let i = 0; i < 10; i++) expect((await attempt("a@larkspur.example", "203.0.113.1", wrong)).status).toBe(401);
    const stopped = await attempt("A@Larkspur.example", "203.0.113.1", right);
    expect(stopped.status).toBe(429);
    expect(Number(stopped.headers.get("retry-after"))).toBeGreaterThan(0);
    expect(await stopped.json()).toMatchObject({ code: "too_many_requests", url: expect.stringContaining("/sign-in") });
    expect((await attempt("b@larkspur.example", "203.0.113.1", wrong)).status).toBe(401);
  });

  it("forgets wrong attempts after a right one", async () => {
    for (let i = 0; i < 9; i++) await attempt("c@larkspur.example", "203.0.113.2", wrong);
    expect((await attempt("c@larkspur.example", "203.0.113.2", right)).status).toBe(200);
    for (let i = 0; i < 10; i++) expect((await attempt("c@larkspur.example", "203.0.113.2", wrong)).status).toBe(401);
  });

  it("stops guesses at one account that come from everywhere", async () => {
    for (let i = 0; i < 50; i++) await attempt("d@larkspur.example", `203.0.113.${i}`, wrong);
    expect((await attempt("d@larkspur.example", "198.51.100.1", right)).status).toBe(429);
  });

  it("does not keep emails or addresses in the counters", async () => {
    const { rows } = await adminDb().$client.query("select key from rate_limits");
    expect(rows.length).toBeGreaterThan(0);
    expect(JSON.stringify(rows)).not.toMatch(/larkspur|203\.0/);
  });
});

describe("sealText", () => {
  it("opens with the same secret and salt only, and not when changed", () => {
    const sealed = sealText("body", "secret", "salt");
    expect(openText(sealed, "secret", "salt")).toBe("body");
    expect(() => openText(sealed, "secret", "other")).toThrow();
    expect(() => openText(sealed, "other", "salt")).toThrow();
    const bytes = Buffer.from(sealed, "base64");
    bytes[30]! ^= 1;
    expect(() => openText(bytes.toString("base64"), "secret", "salt")).toThrow();
  });
});
