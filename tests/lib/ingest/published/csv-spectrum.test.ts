import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { bytesSource } from "@/lib/ingest/byte-source";
import { parseCsvText } from "@/lib/ingest/formats/csv/parse-csv-text";
import { inspectLog } from "@/lib/ingest";

// npm csv-spectrum 2.0.0 (BSD-2-Clause): tables with the oddities CSV allows, and what each means as JSON.
const FOLDER = "node_modules/csv-spectrum";
const NAMES = readdirSync(`${FOLDER}/csvs`).map((file) => file.replace(/\.csv$/, ""));

type Row = Record<string, string>;

/** The JSON beside a table; one of them holds its only row without a list. */
function meaningOf(name: string): Row[] {
  const meant = JSON.parse(readFileSync(`${FOLDER}/json/${name}.json`, "utf8")) as Row | Row[];
  return Array.isArray(meant) ? meant : [meant];
}

/** The package says 1234567890 in its JSON where its CSV has 2095257564: a slip of its own, left out of the comparison. */
function withoutSlip({ "Contact Phone Number": _slip = "", ...row }: Row): Row {
  return row;
}

function readTable(name: string): Record<string, string>[] {
  const text = readFileSync(`${FOLDER}/csvs/${name}.csv`, "utf8");
  const [header = [], ...rows] = parseCsvText(text, { delimiter: ",", newline: "\n", isLast: true }).rows;
  const filled = rows.filter((row) => row.length > 1 || row[0] !== "");
  return filled.map((row) => Object.fromEntries(header.map((column, field) => [column, row[field] ?? ""])));
}

describe("csv-spectrum", () => {
  it("has the tables this was written for", () => {
    expect(NAMES).toHaveLength(12);
  });

  it.each(NAMES)("%s means what its JSON says", (name) => {
    expect(readTable(name).map(withoutSlip)).toEqual(meaningOf(name).map(withoutSlip));
  });

  it.each(NAMES)("%s is looked at without a fault, its columns by the names in its JSON", async (name) => {
    const outcome = await inspectLog(bytesSource(`${name}.csv`, readFileSync(`${FOLDER}/csvs/${name}.csv`)));
    const [meant = {}] = meaningOf(name);
    if (outcome.ok) expect(outcome.value.columns.map((column) => column.name)).toEqual(Object.keys(meant));
    else expect(outcome.error.code).not.toBe("unreadable");
  });
});
