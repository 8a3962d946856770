import { describe, expect, it } from "vitest";
import { returnAddress } from "@/lib/access/return-address";

const BASE = "http://127.0.0.1:3000";

describe("the address to return to", () => {
  it.each([
    ["/larkspur-flats/fields?x=1", `${BASE}/larkspur-flats/fields?x=1`],
    [`${BASE}/s/abc`, `${BASE}/s/abc`],
  ])("stays on this site: %s", (wished, expected) => {
    expect(returnAddress(wished, BASE)).toBe(expected);
  });

  it.each([
    "http://127.0.0.1:3000.elsewhere.example/",
    "http://127.0.0.1:3000abc",
    "http://127.0.0.1:9/",
    "//elsewhere.example/",
    "/\\elsewhere.example",
    "javascript:alert(1)",
    "http://[",
  ])("never leaves it, and never fails: %s", (wished) => {
    expect(returnAddress(wished, BASE)).toBe(BASE);
  });
});
