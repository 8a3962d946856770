import { describe, expect, it } from "vitest";
import { csvCell, writeCsv } from "@/components/ui/write-csv";

describe("csv files", () => {
  it("keeps a spreadsheet from running a text as a formula", () => {
    for (const text of ["=1+1", "+1", "-1 day", "@sum", "\tx", "\rx"])
      expect(csvCell(text).replace(/^"/, "")).toMatch(/^'/);
    expect(csvCell("Row 7 = worn")).toBe("Row 7 = worn");
  });

  it("leaves numbers numbers, and the missing empty", () => {
    expect([csvCell(-98.6), csvCell(0), csvCell(NaN), csvCell(null), csvCell(undefined)]).toEqual([
      "-98.6",
      "0",
      "",
      "",
      "",
    ]);
  });

  it("quotes as RFC 4180 says", () => {
    expect(
      writeCsv(
        ["a", "b"],
        [
          ['say "hi"', "x,y"],
          ["two\nlines", 1],
        ],
      ),
    ).toBe('a,b\r\n"say ""hi""","x,y"\r\n"two\nlines",1\r\n');
  });
});
