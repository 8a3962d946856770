import type { LogColumns } from "@/lib/schemas/logs";

type Column = LogColumns["columns"][number];

/** A found column with a proposal, sure unless said otherwise. */
export function makeColumn(
  name: string,
  proposal: Partial<NonNullable<Column["proposal"]>> | null,
  sample = ["212"],
): Column {
  const whole = proposal && {
    channel: "speed",
    unit: "mph",
    confidence: 0.95,
    reason: "the header says so",
    ...proposal,
  };
  return { name, sample, min: null, max: null, proposal: whole, words: "" };
}

/** What a small wide file of the Larkspur drill looks like to the columns screen. */
export function makeFound(extra: Column[] = [], rows = 3): LogColumns {
  const perRow = Array.from({ length: rows }, (_, index) =>
    makeColumn(`DF_0${index + 1}_lbf`, { channel: "downforce", row: index + 1, unit: "lbf" }),
  );
  const placing = [
    makeColumn("LON_deg", { channel: "longitude", unit: "deg" }, ["-98.61"]),
    makeColumn("LAT_deg", { channel: "latitude", unit: "deg" }, ["38.41"]),
  ];
  return {
    format: "csv",
    shape: "wide",
    columns: [...placing, ...perRow, ...extra],
    notes: [],
    mapping: null,
    recipe: null,
  };
}
