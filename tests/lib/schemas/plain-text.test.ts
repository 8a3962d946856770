import { describe, expect, it } from "vitest";
import { plainText } from "@/lib/schemas/plain-text";

const name = plainText(40);

describe("a name", () => {
  it.each(["East quarter", "Mühlgrund · 3", "Champ de l'étang", "東の畑", "नदी किनारा"])(
    "in any script stands: %s",
    (text) => {
      expect(name.parse(` ${text} `)).toBe(text);
    },
  );

  it.each(["Barn\r\n\r\nClick here", "tab\there", "\u202egnihton", "invisible\u200bspace", "\u0000", "x".repeat(41)])(
    "hides nothing and keeps to one line: %j",
    (text) => {
      expect(name.safeParse(text).success).toBe(false);
    },
  );
});
