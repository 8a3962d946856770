import { unzipSync } from "fflate";
import Papa from "papaparse";
import { describe, expect, it } from "vitest";
import { createFixtureLog } from "@/tests/support/fixture-logs";
import { writeLongCsv, writeWideCsv } from "@/lib/simulator/writers/write-csv";
import { writeGeoJson } from "@/lib/simulator/writers/write-geojson";
import { writeShapefileZip } from "@/lib/simulator/writers/write-shapefile";
import { valuesOf } from "@/tests/lib/simulator/quiet-log";

const { log } = createFixtureLog();
const RECORD = 12;
const ROW = 7;
const AT = RECORD * log.rows + ROW - 1;

describe("writeWideCsv", () => {
  it("writes one line a record, which papaparse reads back", () => {
    const lines = Papa.parse<Record<string, string>>(writeWideCsv(log), { header: true, skipEmptyLines: true });
    expect(lines.errors).toEqual([]);
    expect(lines.data).toHaveLength(log.records);
    const line = lines.data[RECORD] ?? {};
    expect(Number(line["Downforce row 7 (N)"])).toBe(valuesOf(log, "downforce")[AT]);
    expect(Number(line["Depth row 7 (mm)"])).toBeCloseTo((valuesOf(log, "depth")[AT] ?? NaN) * 1000, 1);
    expect(Number(line["Longitude (deg)"])).toBeCloseTo(log.longitude[RECORD] ?? NaN, 8);
    expect(Date.parse(line["Time (UTC)"] ?? "")).toBe(log.timeMs[RECORD]);
  });

  it("converts units by the published factors", () => {
    const style = { naming: "short", force: "lbf", depth: "in", speed: "mph", forceDecimals: 3 } as const;
    const line = Papa.parse<Record<string, string>>(writeWideCsv(log, style), { header: true }).data[RECORD] ?? {};
    // NIST SP 811 (2008), appendix B: 1 lbf = 4.448222 N, 1 in = 25.4 mm, 1 mi/h = 0.44704 m/s.
    expect(Number(line["DF_07_lbf"]) * 4.448222).toBeCloseTo(valuesOf(log, "downforce")[AT] ?? NaN, 1);
    expect(Number(line["DP_07_in"]) * 0.0254).toBeCloseTo(valuesOf(log, "depth")[AT] ?? NaN, 4);
    expect(Number(line["SPD_mph"]) * 0.44704).toBeCloseTo(log.speedMps?.[RECORD] ?? NaN, 2);
  });

  it("writes kilograms-force and decanewtons too", () => {
    const read = (force: "kgf" | "daN"): number => {
      const text = writeWideCsv(log, { force, forceDecimals: 3 });
      const line = Papa.parse<Record<string, string>>(text, { header: true }).data[RECORD];
      return Number(line?.[`Downforce row 7 (${force})`]);
    };
    // NIST SP 811 (2008): 1 kgf = 9.80665 N exactly.
    expect(read("kgf") * 9.80665).toBeCloseTo(valuesOf(log, "downforce")[AT] ?? NaN, 1);
    expect(read("daN") * 10).toBeCloseTo(valuesOf(log, "downforce")[AT] ?? NaN, 1);
  });

  it("can use decimal commas, semicolons and a byte-order mark", () => {
    const text = writeWideCsv(log, { delimiter: ";", decimalComma: true, byteOrderMark: true, newline: "\r\n" });
    expect(text.charCodeAt(0)).toBe(0xfeff);
    const [, first = ""] = text.split("\r\n");
    expect(first.split(";")[1]).toBe((log.longitude[0] ?? NaN).toFixed(8).replace(".", ","));
  });

  it("leaves a missing reading empty", () => {
    const values = valuesOf(log, "downforce");
    const missing = values.findIndex(Number.isNaN);
    const record = Math.floor(missing / log.rows);
    const line = Papa.parse<Record<string, string>>(writeWideCsv(log), { header: true }).data[record] ?? {};
    expect(missing).toBeGreaterThanOrEqual(0);
    expect(line[`Downforce row ${(missing % log.rows) + 1} (N)`]).toBe("");
  });
});

describe("writeLongCsv", () => {
  it("writes one line a record and row", () => {
    const lines = Papa.parse<Record<string, string>>(writeLongCsv(log), { header: true, skipEmptyLines: true }).data;
    expect(lines).toHaveLength(log.records * log.rows);
    expect(lines[AT]?.["Row"]).toBe(String(ROW));
    expect(Number(lines[AT]?.["Downforce (N)"])).toBe(valuesOf(log, "downforce")[AT]);
  });
});

describe("writeGeoJson", () => {
  it("writes one point a record", () => {
    const parsed: unknown = JSON.parse(writeGeoJson(log));
    expect(parsed).toMatchObject({ type: "FeatureCollection" });
    const { features } = parsed as { features: GeoJSON.Feature<GeoJSON.Point>[] };
    expect(features).toHaveLength(log.records);
    expect(features[RECORD]?.geometry.coordinates[1]).toBeCloseTo(log.latitude[RECORD] ?? NaN, 8);
    expect(features[RECORD]?.properties?.["Downforce row 7 (N)"]).toBe(valuesOf(log, "downforce")[AT]);
  });
});

describe("writeShapefileZip", () => {
  it("holds the five files, which shpjs reads back", async () => {
    const bytes = writeShapefileZip(log, "seeding");
    expect(Object.keys(unzipSync(bytes)).sort()).toEqual([
      "seeding.cpg",
      "seeding.dbf",
      "seeding.prj",
      "seeding.shp",
      "seeding.shx",
    ]);
    const collection = await readByShpjs(bytes);
    expect(collection.features).toHaveLength(log.records);
    const feature = collection.features[RECORD];
    expect(feature?.geometry).toMatchObject({ type: "Point" });
    expect((feature?.geometry as GeoJSON.Point).coordinates[0]).toBeCloseTo(log.longitude[RECORD] ?? NaN, 9);
    expect(feature?.properties?.["DF_07_N"]).toBe(valuesOf(log, "downforce")[AT]);
    expect(feature?.properties?.["TIME_utc"]).toBe(new Date(log.timeMs[RECORD] ?? NaN).toISOString());
  });

  it("gives the same bytes for the same log", () => {
    expect(writeShapefileZip(log, "seeding")).toEqual(writeShapefileZip(log, "seeding"));
  });
});

type ReadShapefile = (bytes: ArrayBuffer) => Promise<GeoJSON.FeatureCollection>;

/** An outside reader (shpjs 6.2.0). It ships no types, so the name is kept from the compiler and the shape stated here. */
async function readByShpjs(bytes: Uint8Array): Promise<GeoJSON.FeatureCollection> {
  const name: string = "shpjs";
  const { default: read } = (await import(name)) as { default: ReadShapefile };
  return read(bytes.slice().buffer as ArrayBuffer);
}
