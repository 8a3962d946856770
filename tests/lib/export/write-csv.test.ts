import Papa from "papaparse";
import { describe, expect, it } from "vitest";
import { flagCodes } from "@/lib/cleaning/flags";
import type { ReadingsTable } from "@/lib/export/columns/readings-table";
import { csvHead, csvLines, textCell } from "@/lib/export/write-csv";
import { bytesSource } from "@/lib/ingest/byte-source";
import type { MachineLog } from "@/lib/logs/machine-log";
import { mustRead } from "@/tests/lib/ingest/support/make-source";
import { exportReadings, expectSameLog, mustBuild, type MadeExport } from "@/tests/lib/export/make-export";
import { createFixtureLog } from "@/tests/support/fixture-logs";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

const { log, truth } = createFixtureLog();
const { machine } = truth.options;
const placed = mustBuild(log, machine);

function csvOf({ table, batches }: Pick<MadeExport, "table" | "batches">): string {
  return csvHead(table) + batches.map((batch) => csvLines(table, batch)).join("");
}

function parse(text: string): Record<string, string>[] {
  const parsed = Papa.parse<Record<string, string>>(text, { header: true, skipEmptyLines: true });
  expect(parsed.errors).toEqual([]);
  return parsed.data;
}

async function readBack(made: MadeExport): Promise<MachineLog> {
  const source = bytesSource("export.csv", new TextEncoder().encode(csvOf(made)));
  return (await mustRead(source, made.about.readAgain!)).log;
}

describe("readings as CSV, one line a record and row", () => {
  const made = exportReadings(placed);
  const lines = parse(csvOf(made));

  it("name the unit in the column and have one line for each record and row", () => {
    expect(Object.keys(lines[0]!)).toEqual([
      ...["record", "sourceLine", "pass", "row", "time", "lonDeg", "latDeg", "headingDeg", "speedMps"],
      ...["working", "flags", "antennaLonDeg", "antennaLatDeg"],
      ...["downforceN", "marginN", "depthM", "resistanceN"],
    ]);
    expect(lines).toHaveLength(log.records * 8);
  });

  it("hold every reading exactly as it is stored, and missing ones as nothing", () => {
    let missing = 0;
    for (const id of ["downforce", "margin", "depth"] as const) {
      const channel = log.channels.find((one) => one.id === id)!;
      const name = { downforce: "downforceN", margin: "marginN", depth: "depthM" }[id];
      lines.forEach((line, at) => {
        const stored = channel.values[at]!;
        if (Number.isNaN(stored)) missing += 1;
        expect(line[name] === "" ? NaN : Math.fround(Number(line[name]))).toBe(stored);
      });
    }
    expect(missing).toBeGreaterThan(10);
  });

  it("tell resistance by the balance of the row unit: force + 82 kg x 9.80665 m/s2 - margin (hand-worked)", () => {
    const some = lines.filter((line) => line.resistanceN !== "");
    expect(some.length).toBeGreaterThan(1000);
    for (const line of some) {
      const balance = Number(line.downforceN) + 82 * 9.80665 - Number(line.marginN);
      expect(Math.abs(Number(line.resistanceN) - balance)).toBeLessThan(0.001);
      expect(Number(line.marginN)).toBeGreaterThan(0);
    }
  });

  it("say in words what is doubtful", () => {
    lines.forEach((line, at) => {
      expect(line.flags === "" ? [] : line.flags!.split(";")).toEqual(flagCodes(placed.flags[Math.floor(at / 8)]!));
    });
    expect(lines.some((line) => line.flags!.includes("not-working"))).toBe(true);
  });

  it("are read in again by the mapping beside them: the same values row by row", async () => {
    const again = await readBack(made);
    expect(again).toMatchObject({ records: log.records, rows: 8 });
    for (const channel of log.channels) {
      expect(again.channels.find(({ id }) => id === channel.id)?.values).toEqual(channel.values);
    }
    expectSameLog(mustBuild(again, machine), placed);
  });
});

describe("readings as CSV, one line a record", () => {
  const made = exportReadings(placed, "wide");

  it("stand side by side by row", () => {
    const [first] = parse(csvOf(made));
    expect(Object.keys(first!)).toContain("marginN_8");
    expect(parse(csvOf(made))).toHaveLength(log.records);
    expect(made.table.geometry).toBe("none");
  });

  it("are read in again with the same machine: the same passes and statistics of every row", async () => {
    expectSameLog(mustBuild(await readBack(made), machine), placed);
  });
});

describe("texts in CSV", () => {
  it("cannot run as a formula", () => {
    for (const text of ["=1+1", "+1", "-1", "@sum", "\tx", "\rx"]) {
      expect(Papa.parse<string[]>(textCell(text), { delimiter: ",", newline: "\n" }).data[0]![0]).toBe(`'${text}`);
    }
    expect(textCell("turning;short-pass")).toBe("turning;short-pass");
  });

  it("are quoted as RFC 4180 says", () => {
    expect(textCell('say "hi", twice')).toBe('"say ""hi"", twice"');
    expect(textCell("two\nlines")).toBe('"two\nlines"');
  });

  it("take the danger out of channel names, and keep them apart", () => {
    const hostile = makeLog({
      records: straightTrack({ from: [0, 0], headingDeg: 0, records: 30 }),
      channels: ["other:=cmd|' /C calc'!A1", 'other:,"\n', "other:Flow rate", "other:flow rate"].map((id) => ({
        id: id as "other:x",
        unit: "1",
        value: (record) => record,
      })),
    });
    const made = exportReadings(mustBuild(hostile, makeSeeder()));
    const [header] = Papa.parse<string[]>(csvHead(made.table)).data;
    expect(header!.slice(-4)).toEqual(["otherCmdCCalcA1", "other", "otherFlowRate", "otherFlowRate_2"]);
    for (const name of header!) expect(name).toMatch(/^\p{L}[\p{L}\p{N}_]*$/u);
    for (const { shortName } of made.table.columns) expect(shortName).toMatch(/^[A-Z][A-Z0-9_]{0,9}$/);
    expect(new Set(made.table.columns.map(({ shortName }) => shortName)).size).toBe(made.table.columns.length);
    expect(parse(csvOf(made))).toHaveLength(30 * 4);
  });
});

describe("logs that lack something", () => {
  it("without a machine have guessed rows and no resistance", () => {
    const made = exportReadings(mustBuild(log, null));
    const names = made.table.columns.map((column) => column.name);
    expect(names).not.toContain("resistanceN");
    expect(made.about.machine).toBeNull();
    expect(made.about.rows.isGuessed).toBe(true);
    expect(parse(csvOf(made))).toHaveLength(log.records * 8);
  });

  it("without records are a header", () => {
    const table: ReadingsTable = exportReadings(placed).table;
    expect(parse(csvHead(table))).toEqual([]);
    expect(csvHead(table).endsWith("\r\n")).toBe(true);
  });

  it("without a position in a record leave its place empty", () => {
    const gap = { ...log, longitude: log.longitude.slice(), latitude: log.latitude.slice() };
    gap.longitude[5] = gap.latitude[5] = NaN;
    const lines = parse(csvOf(exportReadings(mustBuild(gap, machine))));
    expect(lines.slice(40, 48).map(({ lonDeg, latDeg }) => [lonDeg, latDeg])).toEqual(Array(8).fill(["", ""]));
    expect(lines[40]!.flags).toContain("no-position");
  });

  it("without rows have one line a record", () => {
    const whole = makeLog({ records: straightTrack({ from: [0, 0], headingDeg: 90, records: 20 }), rows: 1 });
    const channel = { id: "yieldFlow", unit: "kg/s", rows: 1, perRow: false, resolution: 0.1 } as const;
    whole.channels = [{ ...channel, values: new Float32Array(20).fill(3.5) }];
    const lines = parse(csvOf(exportReadings(mustBuild(whole, null))));
    expect(lines.map((line) => line.yieldFlowKgPerS)).toEqual(Array(20).fill("3.5"));
  });

  it("whose clock starts at 0 tell seconds instead of a time", () => {
    const relative = { ...log, timeIsRelative: true, timeMs: log.timeMs.map((time) => time - log.timeMs[0]!) };
    const [first, second] = parse(csvOf(exportReadings(mustBuild(relative, machine), "wide")));
    expect(first).not.toHaveProperty("time");
    expect(Number(second!.timeS) - Number(first!.timeS)).toBeCloseTo((log.timeMs[1]! - log.timeMs[0]!) / 1000, 3);
  });
});
