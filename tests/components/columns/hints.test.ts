import { describe, expect, it } from "vitest";
import { startLayout } from "@/components/columns/column-choice";
import { changeColumns } from "@/components/columns/number-rows";
import { makeColumn, makeFound } from "@/tests/components/columns/make-columns";

const unknown = (name: string, row: number) => ({ ...makeColumn(name, null), hint: { unit: "kgf", row } });

describe("columns of unknown meaning whose headers name unit and row", () => {
  it("keep both when the person says what they are, and make the file wide", () => {
    const found = {
      ...makeFound([unknown("Ukwaa 2 (kgf)", 2), unknown("Ukwaa 1 (kgf)", 1)], 0),
      shape: "single" as const,
    };
    const names = ["Ukwaa 2 (kgf)", "Ukwaa 1 (kgf)"];
    const before = startLayout(found);
    expect(before.choices[names[0]!]).toMatchObject({ use: "undecided", unit: "kgf", row: 2 });
    const after = changeColumns(before, names, { use: "channel", channel: "downforce" });
    expect(after.shape).toBe("wide");
    expect(names.map((name) => after.choices[name])).toMatchObject([
      { channel: "downforce", unit: "kgf", row: 2 },
      { channel: "downforce", unit: "kgf", row: 1 },
    ]);
  });
});
