import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { replaceContainer } from "@/app/_server/container";
import { hasUnreadableReturnCookie, mendSignInRequest } from "@/app/_server/mend-sign-in";
import { makeContainer } from "@/tests/support/make-container";

const ROOT = "http://localhost:3000/api/auth";

// Nothing here asks a database; the environment only has to be whole.
const DATABASE = { DATABASE_URL: "postgres://127.0.0.1:1/none", DATABASE_ADMIN_URL: "postgres://127.0.0.1:1/none" };

beforeAll(() => replaceContainer(makeContainer(DATABASE)));
afterAll(() => replaceContainer(undefined));

const cookie = (value: string) =>
  new Request(`${ROOT}/session`, { headers: { cookie: `next-auth.callback-url=${value}` } });

describe("hasUnreadableReturnCookie", () => {
  it("finds what next-auth would stumble over", () => {
    for (const value of ["nonsense", "http://", "%ff", "javascript:alert(1)"]) {
      expect(hasUnreadableReturnCookie(cookie(value)), value).toBe(true);
    }
    for (const value of ["", "%2Flarkspur-flats", "http%3A%2F%2Flocalhost%3A3000%2F"]) {
      expect(hasUnreadableReturnCookie(cookie(value)), value).toBe(false);
    }
  });
});

describe("mendSignInRequest", () => {
  it("leaves out return addresses that cannot be read, and keeps the rest", async () => {
    const mended = async (query: string) => (await mendSignInRequest(new Request(`${ROOT}/signin?${query}`))).url;
    expect(await mended("callbackUrl=http%3A%2F%2F&error=x")).toBe(`${ROOT}/signin?error=x`);
    expect(await mended("callbackUrl=%ff")).toBe(`${ROOT}/signin`);
    expect(await mended("callbackUrl=/larkspur-flats")).toBe(`${ROOT}/signin?callbackUrl=/larkspur-flats`);
  });

  it("makes a flat form of a JSON body, and refuses what is none", async () => {
    const post = (body: string) =>
      mendSignInRequest(
        new Request(`${ROOT}/signout`, { method: "POST", headers: { "content-type": "application/json" }, body }),
      );
    const form = await (await post('{"csrfToken":"t","json":true,"callbackUrl":{"a":1}}')).formData();
    expect(Object.fromEntries(form)).toEqual({ csrfToken: "t", json: "true" });
    for (const body of ["{bad", "[1]", "null", '"text"'])
      await expect(post(body)).rejects.toMatchObject({ status: 400 });
  });

  it("does not let the credentials be read from an address", async () => {
    const read = mendSignInRequest(new Request(`${ROOT}/callback/credentials?email=a`));
    await expect(read).rejects.toMatchObject({ status: 405 });
  });
});
