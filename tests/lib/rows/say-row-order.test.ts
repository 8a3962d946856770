import { describe, expect, it } from "vitest";
import { sayUncheckedRowOrder } from "@/lib/rows/say-row-order";

describe("a row order that could not be checked", () => {
  it("is said with what was missing for it", () => {
    const evidence = { runs: 0, agreeing: 0, opposing: 0 };
    expect(sayUncheckedRowOrder({ evidence, reason: "The rows begin and end all at once." })).toBe(
      "Row order (row 1 left) could not be checked: no rows switch off at angled edges.",
    );
  });

  it("is said with the ends that were too few", () => {
    const evidence = { runs: 2, agreeing: 2, opposing: 0 };
    expect(sayUncheckedRowOrder({ evidence, reason: "Only 2 ends of passes show rows switching." })).toBe(
      "Row order (row 1 left) could not be checked: only 2 ends of passes show rows switching.",
    );
  });
});
