import { describe, expect, it } from "vitest";
import { multiPolygonWkb, pointWkb } from "@/lib/export/geometry/write-wkb";
import { polygonWkt } from "@/lib/export/geometry/write-wkt";
import { exportPath } from "@/lib/export/export-path";
import { nameExport } from "@/lib/export/name-export";
import { readmeText } from "@/lib/export/readme-text";
import { dbfNumber, dbfRows } from "@/lib/export/shapefile/dbf";
import { cellsOf, exportReadings, mustBuild } from "@/tests/lib/export/make-export";
import { createFixtureLog } from "@/tests/support/fixture-logs";

const hex = (bytes: Uint8Array) => Buffer.from(bytes).toString("hex");

describe("well-known binary and text", () => {
  it("writes POINT (1 2), little-endian (hand-worked from OGC 06-103r4)", () => {
    expect(hex(pointWkb(1, 2))).toBe("0101000000000000000000f03f0000000000000040");
  });

  it("writes any polygon as one of many, rings by the right-hand rule", () => {
    const clockwise = {
      type: "Polygon" as const,
      coordinates: [
        [
          [0, 0],
          [0, 1],
          [1, 1],
          [0, 0],
        ],
      ],
    };
    expect(hex(multiPolygonWkb(clockwise)).slice(0, 36)).toBe("010600000001000000010300000001000000");
    expect(multiPolygonWkb(clockwise)).toHaveLength(9 + 9 + 4 + 4 * 16);
    expect(polygonWkt(clockwise)).toBe("POLYGON ((0 0, 1 1, 0 1, 0 0))");
  });
});

describe("cells of a dBASE table", () => {
  it("stand at the right, with fewer decimals or as a power of ten where they would not fit", () => {
    expect(dbfNumber(412.5, { width: 8, decimals: 2 })).toBe("  412.50");
    expect(dbfNumber(123_456.789, { width: 8, decimals: 2 })).toBe("123456.8");
    expect(Number(dbfNumber(1.5e30, { width: 14, decimals: 2 }))).toBe(1.5e30);
    expect(dbfNumber(-1.5e30, { width: 4, decimals: 2 })).toBe("");
    expect(dbfNumber(NaN, { width: 8, decimals: 2 })).toBe("");
  });

  it("cut a text at a whole character", () => {
    const rows = dbfRows([{ name: "A", type: "C", width: 3, decimals: 0 }], 1, () => "aaé");
    expect(new TextDecoder().decode(rows)).toBe(" aa ");
  });
});

describe("names and notes", () => {
  it("of files are safe everywhere", () => {
    expect(nameExport("East quarter, 24 September.csv", "readings")).toBe("east-quarter-24-september-readings");
    expect(nameExport("../../é\r\nSet-Cookie: x", "zones")).toBe("e-set-cookie-x-zones");
    expect(nameExport("麦", "swaths")).toBe("log-swaths");
  });

  it("of addresses ask for the notes beside CSV", () => {
    expect(exportPath("log_a", { format: "csv", level: "readings", shape: "wide" })).toBe(
      "/api/v1/logs/log_a/export?format=csv&level=readings&shape=wide&bundle=zip",
    );
  });

  it("tell where a log came from, and never let a name make lines of its own", () => {
    const { log, truth } = createFixtureLog();
    const { about } = exportReadings(mustBuild(log, truth.options.machine));
    const text = readmeText(
      { ...about, source: { ...about.source, fileName: "a\nMethod\n======\n" } },
      { names: "short", metadataName: "metadata.txt" },
    );
    expect(text).toContain("SHA-256 abab");
    expect(text).toContain("MARGIN_N (marginN) [N]: Weight left on the gauge wheels");
    expect(text).toContain("8-row plot drill, 8 rows 0.25 m apart");
    expect(text.split("\n").filter((line) => line === "Method")).toHaveLength(1);
  });

  it("list every file of a log in several with its own hash, and say that the other is the set's", () => {
    const { log, truth } = createFixtureLog();
    const { about } = exportReadings(mustBuild(log, truth.options.machine));
    const files = ["cd", "ef"].map((pair, index) => ({
      name: `card-${index + 1}.csv`,
      bytes: 400 + index,
      sha256: pair.repeat(32),
      records: index === 0 ? 40 : null,
    }));
    const text = readmeText(
      { ...about, source: { ...about.source, files } },
      { names: "long", metadataName: "metadata.json" },
    );
    expect(text).toContain(`File 1: card-1.csv, 400 bytes, 40 records.\nSHA-256 ${"cd".repeat(32)}`);
    expect(text).toContain(`File 2: card-2.csv, 401 bytes.\nSHA-256 ${"ef".repeat(32)}`);
    expect(text.replaceAll(/\s+/g, " ")).toContain(
      `SHA-256 of the set (over the sorted hashes of its files, one a line): ${"ab".repeat(32)}`,
    );
  });

  it("say of a log in several files which file and line each record came from", () => {
    const { log, truth } = createFixtureLog();
    const placed = mustBuild(log, truth.options.machine);
    const [first, second] = [100, log.records - 100];
    const parts = [
      { file: 1, records: first, linesBefore: 0 },
      { file: 0, records: second, linesBefore: 101 },
    ];
    for (const shape of ["long", "wide"] as const) {
      const { table, batches } = exportReadings({ ...placed, fileParts: { files: 2, parts } }, shape);
      const rows = shape === "long" ? 8 : 1;
      const [file, line] = [cellsOf(table, batches, "sourceFile"), cellsOf(table, batches, "sourceLine")];
      expect(file).toHaveLength(log.records * rows);
      expect([file[0], file[100 * rows - 1], file[100 * rows], file.at(-1)]).toEqual([2, 2, 1, 1]);
      expect(line[0]).toBe(log.sourceLine[0]);
      expect(line[100 * rows]).toBe(log.sourceLine[100]! - 101);
      expect(line.at(-1)).toBe(log.sourceLine.at(-1)! - 101);
    }
    const older = exportReadings({ ...placed, fileParts: { files: 2, parts: null } }).table.columns;
    expect(older.map(({ name }) => name)).not.toContain("sourceFile");
    expect(older.find(({ name }) => name === "sourceLine")?.meaning).toContain("counted on from file to file");
  });
});
