import { describe, expect, it } from "vitest";
import { UNDECIDED, type Choices } from "@/components/columns/column-choice";
import { changeColumns, changeShape, type Layout } from "@/components/columns/number-rows";

function makeLayout(names: string[], shape: Layout["shape"] = "single"): Layout {
  return { shape, choices: Object.fromEntries(names.map((name) => [name, UNDECIDED])) };
}

const FORCE = { use: "channel", channel: "downforce", unit: "lbf", row: null } as const;
const rowsOf = (choices: Choices) => Object.values(choices).map(({ row }) => row);

describe("changeColumns", () => {
  it("leaves one column of a channel without a row", () => {
    const one = changeColumns(makeLayout(["A1", "A2"]), ["A1"], FORCE);
    expect(one.shape).toBe("single");
    expect(rowsOf(one.choices)).toEqual([null, null]);
  });

  it("numbers columns in the order of the file, in whatever order they are said", () => {
    const first = changeColumns(makeLayout(["A1", "A2", "A3"]), ["A3"], FORCE);
    const second = changeColumns(first, ["A1"], FORCE);
    const third = changeColumns(second, ["A2"], FORCE);
    expect(rowsOf(second.choices)).toEqual([1, null, 2]);
    expect(rowsOf(third.choices)).toEqual([1, 2, 3]);
    expect(third.shape).toBe("wide");
  });

  it("keeps rows that were typed and goes on after them", () => {
    const typed = changeColumns(changeColumns(makeLayout(["A1", "A2"]), ["A1"], FORCE), ["A1"], { row: 7 });
    expect(typed.shape).toBe("wide");
    expect(rowsOf(changeColumns(typed, ["A2"], FORCE).choices)).toEqual([7, 8]);
  });

  it("numbers nothing where a column holds the row numbers", () => {
    const long = changeColumns(makeLayout(["R", "A1", "A2"], "long"), ["R"], { use: "channel", channel: "row" });
    const both = changeColumns(long, ["A1", "A2"], FORCE);
    expect(both.shape).toBe("long");
    expect(rowsOf(both.choices)).toEqual([null, null, null]);
  });
});

describe("changeShape", () => {
  it("takes the rows away and gives them back", () => {
    const wide = changeColumns(makeLayout(["A1", "A2"]), ["A1", "A2"], FORCE);
    const single = changeShape(wide, "single");
    expect(rowsOf(single.choices)).toEqual([null, null]);
    expect(rowsOf(changeShape(single, "wide").choices)).toEqual([1, 2]);
  });
});
