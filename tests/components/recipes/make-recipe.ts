import type { Recipe } from "@/lib/schemas/recipes";

/** A recipe as the API gives it. */
export function makeRecipe(change: Partial<Recipe> = {}): Recipe {
  const rows = [1, 2, 3];
  const columnNames = ["time", "lat", "lon", ...rows.map((row) => `DF_${row}`), ...rows.map((row) => `GWM_${row}`)];
  return {
    id: "rcp_drill",
    name: "Drill, pounds",
    version: 2,
    format: "csv",
    shape: "wide",
    columnNames,
    mapping: {
      shape: "wide",
      columns: [
        { name: "time", channel: "time", unit: "iso8601" },
        { name: "lat", channel: "latitude", unit: "deg" },
        { name: "lon", channel: "longitude", unit: "deg" },
        ...rows.map((row) => ({
          name: `DF_${row}`,
          channel: "downforce" as const,
          row,
          unit: "lbf" as const,
          missing: [-999],
        })),
        ...rows.map((row) => ({ name: `GWM_${row}`, channel: "margin" as const, row, unit: "lbf" as const })),
      ],
    },
    machine: null,
    note: null,
    createdAt: "2031-10-01T08:00:00.000Z",
    createdBy: { id: "usr_ada", name: "Ada Field" },
    usedAt: "2031-10-14T08:00:00.000Z",
    logCount: 4,
    deletedAt: null,
    ...change,
  };
}
