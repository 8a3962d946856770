import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { z } from "zod";
import { inspectLog, readLog } from "@/lib/ingest";
import { bytesSource } from "@/lib/ingest/byte-source";
import { mappingFits } from "@/lib/ingest/mapping";
import { proposeMapping } from "@/lib/ingest/propose-mapping";
import type { MachineLog } from "@/lib/logs/machine-log";
import { errorOf, mustInspect, readAsProposed } from "./support/make-source";

const fixture = (path: string) => bytesSource(path.split("/").at(-1) ?? path, readFileSync(`fixtures/logs/${path}`));

/** Smallest and largest value of each row, as the simulator knows them. */
const Truth = z.object({
  records: z.number(),
  rows: z.number(),
  channels: z.array(
    z.object({ id: z.string(), rows: z.array(z.object({ row: z.number(), min: z.number(), max: z.number() })) }),
  ),
});

/** The smallest and largest value of a row over the working records. */
function extentOf(log: MachineLog, id: string, row: number): [min: number, max: number] {
  const channel = log.channels.find((candidate) => candidate.id === id);
  let [min, max] = [Infinity, -Infinity];
  for (let record = 0; record < log.records; record++) {
    const value = channel?.values[record * channel.rows + row - 1] ?? NaN;
    if (log.working?.[record] === 0 || Number.isNaN(value)) continue;
    min = Math.min(min, value);
    max = Math.max(max, value);
  }
  return [min, max];
}

/** How far a value may be off by the rounding of the file: half of its last digit, in SI. */
const SEEDING: [path: string, forceN: number, depthM: number][] = [
  ["csv/wide-newtons/input.csv", 0.51, 0.00026],
  ["csv/wide-pounds/input.csv", 0.75, 0.0003],
  ["csv/wide-decimal-comma/input.csv", 0.75, 0.0003],
  ["csv/long-newtons/input.csv", 0.51, 0.00026],
  ["geojson/points/input.geojson", 0.75, 0.0003],
  ["shapefile/points/input.zip", 0.51, 0.00026],
];

describe("the same simulated log in six kinds of file", () => {
  const truth = Truth.parse(JSON.parse(readFileSync("fixtures/logs/csv/wide-newtons/truth.json", "utf8")));

  it.each(SEEDING)("%s holds what the simulator drove", async (path, forceN, depthM) => {
    const { log, notes } = await readAsProposed(fixture(path));
    expect(notes).toEqual([]);
    expect(log).toMatchObject({ kind: "seeding", records: truth.records, rows: truth.rows });
    for (const channel of truth.channels) {
      const tolerance = channel.id === "depth" ? depthM : forceN;
      for (const { row, min, max } of channel.rows) {
        const [low, high] = extentOf(log, channel.id, row);
        expect(Math.abs(low - min)).toBeLessThan(tolerance);
        expect(Math.abs(high - max)).toBeLessThan(tolerance);
      }
    }
  });

  it("agree on time and place", async () => {
    const [first, ...others] = await Promise.all(
      SEEDING.map(async ([path]) => (await readAsProposed(fixture(path))).log),
    );
    for (const log of others) {
      for (let record = 0; record < log.records; record++) {
        expect(Math.abs((log.timeMs[record] ?? 0) - (first?.timeMs[record] ?? 0))).toBeLessThan(1);
        expect(log.longitude[record]).toBeCloseTo(first?.longitude[record] ?? NaN, 7);
        expect(log.latitude[record]).toBeCloseTo(first?.latitude[record] ?? NaN, 7);
      }
    }
  });

  it("a mapping confirmed for one file fits only its own kind", async () => {
    const pounds = await mustInspect(fixture("csv/wide-pounds/input.csv"));
    const newtons = await mustInspect(fixture("csv/wide-newtons/input.csv"));
    const { mapping } = proposeMapping(pounds);
    expect(mappingFits(mapping, pounds)).toBe(true);
    expect(mappingFits(mapping, newtons)).toBe(false);
  });
});

describe("bad files", () => {
  it.each([
    ["empty/input.csv", "empty-file"],
    ["header-only/input.csv", "no-readings"],
    ["not-a-log/input.csv", "not-a-log"],
    ["missing-position/input.csv", "missing-position"],
    ["truncated-zip/input.zip", "archive-truncated"],
    ["zip-bomb-small/input.zip", "archive-bomb"],
    ["zip-slip-names/input.zip", "archive-unsafe-name"],
  ])("%s ends in %s", async (path, code) => {
    expect((await errorOf(fixture(`bad/${path}`)))?.code).toBe(code);
  });

  it.each([
    ["ragged-rows/input.csv", "ragged-rows", 2, 12],
    ["zero-position/input.csv", "zero-position", 3, 6],
    ["duplicate-times/input.csv", "duplicate-times", 3, 12],
  ])("%s is read with the note %s", async (path, code, count, firstLine) => {
    const { notes } = await readAsProposed(fixture(`bad/${path}`));
    expect(notes).toMatchObject([{ code, count, firstLine }]);
  });

  it("a column in an unknown unit waits for a person", async () => {
    const inspection = await mustInspect(fixture("bad/unknown-unit/input.csv"));
    expect(proposeMapping(inspection).undecided).toHaveLength(8);
    expect(inspection.columns.find((column) => column.name.includes("clicks"))?.words).toContain("clicks");
  });

  it("swapped columns are noticed, and a mapping by the headers stops at the line", async () => {
    const source = fixture("bad/swapped-latitude-longitude/input.csv");
    const inspected = await inspectLog(source);
    expect(inspected.ok && inspected.value.notes.map((note) => note.code)).toEqual(["swapped-positions"]);
    const outcome = await readLog(source, {
      shape: "wide",
      columns: [
        { name: "Longitude (deg)", channel: "longitude", unit: "deg" },
        { name: "Latitude (deg)", channel: "latitude", unit: "deg" },
      ],
    });
    expect(outcome).toMatchObject({ ok: false, error: { code: "latitude-out-of-range", line: 2 } });
  });
});
