import { describe, expect, it } from "vitest";
import { decodeCursor, encodeCursor, pageOf } from "@/lib/paging/cursor";

describe("cursor", () => {
  it("comes back as it went, whatever the name", () => {
    for (const name of ["North quarter", "Straße & 村", '","', ""]) {
      const cursor = encodeCursor([name, "fld_1"]);
      expect(cursor).toMatch(/^[\w-]+$/);
      expect(decodeCursor(cursor)).toEqual([name, "fld_1"]);
    }
    expect(decodeCursor(undefined)).toBeNull();
  });

  it("is refused when nobody gave it out", () => {
    const forged = [btoa('["a"]'), btoa("[1,2]"), btoa("{}"), "%%%", "", encodeCursor(["a\0", "b"])];
    for (const cursor of forged) expect(() => decodeCursor(cursor)).toThrow("cursor");
  });

  it("names a next page only when there is one", () => {
    const parts = (row: string): [string, string] => [row, row];
    expect(pageOf(["a", "b"], 2, parts)).toEqual({ rows: ["a", "b"], nextCursor: null });
    expect(pageOf(["a", "b", "c"], 2, parts)).toEqual({ rows: ["a", "b"], nextCursor: encodeCursor(["b", "b"]) });
  });
});
