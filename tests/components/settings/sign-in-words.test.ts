import { describe, expect, it } from "vitest";
import { signInWords } from "@/components/settings/sign-in-form";

describe("words of a sign-in that fails", () => {
  it("does not tell whether the address is known", () => {
    expect(signInWords("CredentialsSignin", 401)).toBe(
      "That email and password do not belong together. Check both and try again.",
    );
  });

  it("says when to wait, when it is our fault, and nothing when all is well", () => {
    expect(signInWords("too_many_requests")).toContain("Too many tries");
    expect(signInWords("unknown", 429)).toContain("Too many tries");
    expect(signInWords("unknown", 503)).toContain("server");
    expect(signInWords(null)).toBeNull();
  });
});
