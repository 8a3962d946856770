import { describe, expect, it } from "vitest";
import { NOTE_CODES, sayNote } from "@/lib/ingest/records/say-note";

describe("sayNote", () => {
  it.each(NOTE_CODES)("%s is one or two plain sentences, for one and for many", (code) => {
    for (const count of [1, 1234]) {
      const sentence = sayNote(code, count, { place: "line", firstLine: 12, column: "downforce" });
      expect(sentence).toMatch(/^["A-Z.\d-]?.*\.$/i);
      expect(sentence).not.toMatch(/undefined|NaN|say\.|\$\{/);
      expect(sentence.length).toBeGreaterThan(30);
    }
  });

  it("counts in words that agree", () => {
    const at = { place: "line", firstLine: 7 };
    expect(sayNote("zero-position", 1, at)).toContain("1 record stood at");
    expect(sayNote("zero-position", 1, at)).toContain("its position counts as missing. The first is line 7.");
    expect(sayNote("zero-position", 3, at)).toContain("their positions count as missing");
    expect(sayNote("unreadable-value", 2, { ...at, column: "DF_1" })).toContain("2 cells of column 'DF_1'");
  });
});
