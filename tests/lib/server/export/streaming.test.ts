import { randomBytes } from "node:crypto";
import { mkdtempSync, readdirSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { setFlagsFromString } from "node:v8";
import { runInNewContext } from "node:vm";
import { tableFromIPC } from "apache-arrow";
import { afterAll, describe, expect, it } from "vitest";
import { readingsBatches, readingsTable, type ReadingsTable } from "@/lib/export/columns/readings-table";
import { swathsTable } from "@/lib/export/columns/swaths-table";
import type { ExportBatch } from "@/lib/export/export-table";
import { outlineOf } from "@/lib/export/log-parts";
import { arrowChunks } from "@/lib/server/export/arrow-chunks";
import { makeInFolder } from "@/lib/server/export/export-folder";
import { csvChunks, geojsonChunks } from "@/lib/server/export/text-chunks";
import { writeGeopackage } from "@/lib/server/export/write-geopackage";
import { writeShapefile } from "@/lib/server/export/write-shapefile";
import { zipChunks } from "@/lib/server/export/zip-chunks";
import { aboutOf, asAsync, joinChunks } from "@/tests/lib/export/make-export";
import { largeLogPart, largeLogParts, type LargeLog } from "@/tests/lib/export/make-large-log";
import { describeWithGdal, readWithGdal } from "@/tests/support/read-with-gdal";

const folder = mkdtempSync(path.join(tmpdir(), "coulterbook-stream-test-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

setFlagsFromString("--expose-gc");
const collectGarbage = runInNewContext("gc") as () => void;

/** Bytes that are really held: after a collection, those outside the heap too. */
function heldBytes(): number {
  collectGarbage();
  const { heapUsed, external } = process.memoryUsage();
  return heapUsed + external;
}

const LARGE: LargeLog = { passes: 45, recordsAPass: 400, rows: 24 };
const ROWS = LARGE.passes * LARGE.recordsAPass * LARGE.rows;
const outline = outlineOf(largeLogPart({ pass: 1, records: 1, rows: LARGE.rows }).placed);
const table = readingsTable(outline);
const about = aboutOf({ table, outline, shape: "long", readAgain: null });

interface Held {
  mostBytes: number;
  rows: number;
}

/** Batches of the large log; looks at what is held every few passes. */
async function* watched(of: ReadingsTable, held: Held): AsyncGenerator<ExportBatch> {
  for await (const part of largeLogParts(LARGE)) {
    for (const batch of readingsBatches(of, part)) {
      held.rows += batch.rows;
      yield batch;
    }
    if (part.firstRecord % 4000 === 0) held.mostBytes = Math.max(held.mostBytes, heldBytes());
  }
}

async function watch(work: (batches: AsyncGenerator<ExportBatch>) => Promise<number>) {
  const before = heldBytes();
  const held: Held = { mostBytes: before, rows: 0 };
  const written = await work(watched(table, held));
  expect(held.rows).toBe(ROWS);
  return { written, heldMore: held.mostBytes - before };
}

async function countBytes(chunks: AsyncIterable<Uint8Array>): Promise<number> {
  let bytes = 0;
  for await (const chunk of chunks) bytes += chunk.length;
  return bytes;
}

/** A few batches, the packers' windows and the garbage between: nothing that grows with the log. */
const BOUND_BYTES = 16e6;

describe(`a log of ${ROWS} rows`, () => {
  it.each([
    ["CSV", (batches: AsyncGenerator<ExportBatch>) => countBytes(csvChunks(table, batches))],
    ["GeoJSON", (batches: AsyncGenerator<ExportBatch>) => countBytes(geojsonChunks(table, batches, about))],
    ["Arrow", (batches: AsyncGenerator<ExportBatch>) => countBytes(arrowChunks(table, batches, about))],
  ])("is streamed as %s without being held", async (_name, work) => {
    const { written, heldMore } = await watch(work);
    expect(written).toBeGreaterThan(2 * BOUND_BYTES);
    expect(heldMore).toBeLessThan(BOUND_BYTES);
  });

  it("is packed into a zip without being held", async () => {
    const pack = (batches: AsyncGenerator<ExportBatch>) =>
      countBytes(zipChunks([{ name: "readings.csv", content: csvChunks(table, batches) }], new Date(0)));
    const { written, heldMore } = await watch(pack);
    expect(written).toBeGreaterThan(4e6);
    expect(heldMore).toBeLessThan(BOUND_BYTES);
  });

  it("is written as a GeoPackage and a shapefile without being held, whole for GDAL", async () => {
    let file = "";
    const gpkg = await watch(async (batches) => {
      file = await writeGeopackage({ folder, table, batches, about });
      return statSync(file).size;
    });
    expect(gpkg.written).toBeGreaterThan(2 * BOUND_BYTES);
    expect(gpkg.heldMore).toBeLessThan(BOUND_BYTES);
    expect(describeWithGdal(file)).toContain(`Feature Count: ${ROWS}`);
    const shapes = await watch(async (batches) => {
      file = (await writeShapefile({ folder, table, batches, madeOn: new Date("2026-12-01T12:00:00Z") })).shp;
      return statSync(file).size;
    });
    expect(shapes.heldMore).toBeLessThan(BOUND_BYTES);
    expect(describeWithGdal(file)).toContain(`Feature Count: ${ROWS}`);
  });
});

describe("a shapefile's limits", () => {
  const madeOn = new Date("2026-12-01T12:00:00Z");

  it("end it with a sentence that says what to do", async () => {
    const batches = watched(table, { mostBytes: Infinity, rows: 0 });
    const making = makeInFolder(folder, (inside) =>
      writeShapefile({ folder: inside, table, batches, madeOn, maxBytes: 3e6 }),
    );
    await expect(making).rejects.toMatchObject({
      code: "unprocessable",
      detailCode: "export_too_large",
      userMessage: expect.stringContaining("Export a GeoPackage, CSV or Arrow file instead."),
    });
    expect(readdirSync(path.join(folder, "exports"))).toEqual([]);
  });

  it("are 255 columns", async () => {
    const many = { ...table, columns: Array.from({ length: 300 }, () => table.columns[0]!) };
    const making = writeShapefile({ folder, table: many, batches: asAsync([]), madeOn });
    await expect(making).rejects.toMatchObject({ detailCode: "export_too_wide" });
  });
});

describe("a log without a row", () => {
  const swaths = swathsTable(false);
  const madeOn = new Date("2026-12-01T12:00:00Z");

  it.each([
    ["points", table],
    ["polygons", swaths],
  ])("is an empty file of %s for every reader", async (_name, empty) => {
    const gpkg = await writeGeopackage({
      folder: mkdtempSync(`${folder}/empty-`),
      table: empty,
      batches: asAsync([]),
      about,
    });
    expect(describeWithGdal(gpkg)).toContain("Feature Count: 0");
    const shapes = await writeShapefile({
      folder: mkdtempSync(`${folder}/empty-`),
      table: empty,
      batches: asAsync([]),
      madeOn,
    });
    expect(describeWithGdal(shapes.shp)).toContain("Feature Count: 0");
    const arrow = tableFromIPC(await joinChunks(arrowChunks(empty, asAsync([]), about)));
    expect(arrow.numRows).toBe(0);
    expect(arrow.schema.fields.length).toBeGreaterThanOrEqual(empty.columns.length);
    const geojson = new TextDecoder().decode(await joinChunks(geojsonChunks(empty, asAsync([]), about)));
    expect(JSON.parse(geojson)).toMatchObject({ type: "FeatureCollection", features: [] });
  });
});

describe("polygons of any kind", () => {
  // Two parts, the first with a hole, wound both ways: every format winds them as it wants them.
  const shape = {
    type: "MultiPolygon" as const,
    coordinates: [
      [
        [
          [0, 0],
          [0, 4],
          [4, 4],
          [4, 0],
          [0, 0],
        ],
        [
          [1, 1],
          [2, 1],
          [2, 2],
          [1, 2],
          [1, 1],
        ],
      ],
      [
        [
          [10, 10],
          [11, 10],
          [11, 11],
          [10, 10],
        ],
      ],
    ],
  };
  const swaths = swathsTable(true);
  const batch: ExportBatch = { rows: 1, cells: swaths.columns.map(() => Float64Array.of(1)), polygons: [shape] };

  it("keep holes and parts in a GeoPackage and a shapefile, read by GDAL", async () => {
    const input = { table: swaths, about };
    const gpkg = await writeGeopackage({ ...input, folder: mkdtempSync(`${folder}/hole-`), batches: asAsync([batch]) });
    const madeOn = new Date("2026-12-01T12:00:00Z");
    const shapes = await writeShapefile({
      ...input,
      folder: mkdtempSync(`${folder}/hole-`),
      batches: asAsync([batch]),
      madeOn,
    });
    for (const found of [readWithGdal(gpkg, "swaths"), readWithGdal(shapes.shp)]) {
      const polygons = found[0]!.geometry!.coordinates as number[][][][];
      expect(found[0]!.geometry!.type).toBe("MultiPolygon");
      expect(polygons.map((rings) => rings.length).sort()).toEqual([1, 2]);
      expect(polygons.flat(2)).toHaveLength(14);
    }
  });
});

describe("a zip that nobody reads to its end", () => {
  it("stops making the table", async () => {
    let hasEnded = false;
    const endless = async function* () {
      try {
        for (;;) yield randomBytes(65_536);
      } finally {
        hasEnded = true;
      }
    };
    const zip = zipChunks([{ name: "a.csv", content: endless() }], new Date(0));
    for (let chunk = 0; chunk < 4; chunk++) await zip.next();
    await zip.return(undefined);
    await new Promise((resolve) => setTimeout(resolve, 20));
    expect(hasEnded).toBe(true);
  });

  it("breaks off with the fault of what it packs", async () => {
    const faulty = async function* () {
      yield new Uint8Array(10);
      throw new Error("read again");
    };
    const zip = zipChunks([{ name: "a.csv", content: faulty() }], new Date(0));
    await expect(joinChunks(zip)).rejects.toThrow("read again");
  });

  it("is whole otherwise, also in the form for more than 4 GB, for GDAL", async () => {
    for (const isHuge of [false, true]) {
      const content = asAsync([new TextEncoder().encode("row,marginN\r\n7,412.5\r\n")]);
      const file = path.join(folder, `huge-${isHuge}.zip`);
      writeFileSync(file, await joinChunks(zipChunks([{ name: "a.csv", content, isHuge }], new Date(0))));
      expect(readWithGdal(`/vsizip/${file}`)[0]!.properties).toEqual({ row: "7", marginN: "412.5" });
    }
  });
});
