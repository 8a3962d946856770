import { describe, expect, it } from "vitest";
import { sayRecipeColumns, sayRecipeExtras, sayRecipeFile, sumUpRecipe } from "@/components/recipes/say-recipe";
import { makeRecipe } from "@/tests/components/recipes/make-recipe";

describe("a recipe in words", () => {
  it("puts the columns of one meaning together and leaves the others apart", () => {
    const said = sayRecipeColumns(makeRecipe());
    expect(said.map(({ names }) => names)).toEqual(["time", "lat", "lon", "DF_1 … DF_3", "GWM_1 … GWM_3"]);
    expect(said[4]?.meaning).toBe("margin (load left on the gauge wheel) of rows 1 to 3, in pounds-force");
  });

  it("names rows that are no run one by one", () => {
    const { mapping } = makeRecipe();
    const columns = mapping.columns.filter(({ name }) => name !== "DF_2");
    const [, , , force] = sayRecipeColumns({ mapping: { ...mapping, columns } });
    expect(force).toEqual({
      names: "DF_1 and DF_3",
      meaning: "downforce of rows 1, 3, in pounds-force; -999 for missing",
    });
  });

  it("keeps apart columns of one channel in two units", () => {
    const { mapping } = makeRecipe();
    const columns = mapping.columns.map((column) =>
      column.name === "DF_3" ? { ...column, unit: "N" as const } : column,
    );
    expect(sayRecipeColumns({ mapping: { ...mapping, columns } }).map(({ names }) => names)).toContain("DF_3");
  });

  it("says what kind of file it reads, and in short what is in it", () => {
    const recipe = makeRecipe();
    expect(sayRecipeFile(recipe)).toBe("CSV or TSV, one line a moment, a column a row");
    expect(sumUpRecipe(recipe)).toBe("downforce and margin; 3 rows");
  });

  it("says what is kept besides columns", () => {
    const { mapping } = makeRecipe();
    const more = {
      ...mapping,
      crs: "EPSG:32614",
      timeZone: "America/Chicago",
      contact: { kind: "at-the-moment" as const },
    };
    expect(sayRecipeExtras({ mapping: more, machine: null })).toEqual([
      "Local times of America/Chicago",
      "Coordinates in EPSG:32614",
      "Contact: whether the gauge wheel carried load at that moment",
    ]);
  });
});
