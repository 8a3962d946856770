import { describe, expect, it } from "vitest";
import { bytesSource } from "@/lib/ingest/byte-source";
import { mappingFits } from "@/lib/ingest/mapping";
import { proposeMapping } from "@/lib/ingest/propose-mapping";
import { errorOf, mustInspect, mustRead, readAsProposed } from "@/tests/lib/ingest/support/make-source";
import { KNOWN_PROJECTIONS, OLD_DATUM } from "@/tests/lib/ingest/support/projections";
import {
  makeDbf,
  makeManyPointShp,
  makeShp,
  UTM14_PRJ,
  WGS84_PRJ,
  zipOf,
  type DbfColumn,
} from "@/tests/lib/ingest/support/make-shapefile";

const POINTS: [number, number][] = [
  [-98.61, 38.41],
  [-98.62, 38.42],
  [-98.63, 38.43],
];
const COLUMNS: DbfColumn[] = [
  { name: "TIME_utc", type: "C", length: 20, cells: ["2026-09-24T14:05:00Z", "2026-09-24T14:05:01Z", ""] },
  { name: "DF_1_lbf", type: "N", length: 8, cells: ["200.5", "-3", "********"] },
  { name: "DF_2_lbf", type: "F", length: 12, cells: ["2.1000e+002", "210", ""] },
  { name: "WORKING", type: "L", length: 1, cells: ["T", "F", "?"] },
];
const LBF = 4.4482216152605;

const layer = (extra: Record<string, Uint8Array | string> = {}) => ({
  "drill/log.shp": makeShp(POINTS),
  "drill/log.dbf": makeDbf(COLUMNS),
  "drill/log.prj": WGS84_PRJ,
  ...extra,
});
const source = (files: Record<string, Uint8Array | string>) => bytesSource("log.zip", zipOf(files));

describe("zipped point shapefile", () => {
  it("reads positions and every kind of field", async () => {
    const { log, notes } = await readAsProposed(source(layer()));
    expect([...log.longitude]).toEqual([-98.61, -98.62, -98.63]);
    expect([...(log.channels[0]?.values ?? [])]).toEqual(
      [200.5, 210, -3, 210, NaN, NaN].map((value) => Math.fround(value * LBF)),
    );
    expect([...(log.working ?? [])]).toEqual([1, 0, 0]);
    expect(new Date(log.timeMs[1] ?? NaN).toISOString()).toBe("2026-09-24T14:05:01.000Z");
    expect(notes).toEqual([]);
  });

  it("reads points with height, and null shapes as missing positions", async () => {
    const shp = makeShp([[-98.61, 38.41], null, [-98.63, 38.43]], 11);
    const { log, notes } = await readAsProposed(source(layer({ "drill/log.shp": shp })));
    expect([...log.latitude]).toEqual([38.41, NaN, 38.43]);
    expect(notes.map((note) => [note.code, note.firstLine])).toEqual([["no-position", 2]]);
  });

  it("turns a projected layer into degrees by its .prj", async () => {
    // PROJ 9: `printf '40 -100\n40 -99\n' | cs2cs EPSG:4326 EPSG:32614`.
    const shp = makeShp([
      [414639.538157, 4428236.064633],
      [500000, 4427757.218738],
      [500000, 4427757.218738],
    ]);
    const { log } = await readAsProposed(source(layer({ "drill/log.shp": shp, "drill/log.prj": UTM14_PRJ })));
    expect(log.longitude[0]).toBeCloseTo(-100, 8);
    expect(log.latitude[1]).toBeCloseTo(40, 8);
  });

  it.each(KNOWN_PROJECTIONS)("reads a .prj of $name", async ({ prj, east, north, longitude, latitude }) => {
    const shp = makeShp([
      [east, north],
      [east, north],
      [east, north],
    ]);
    const { log, notes } = await readAsProposed(source(layer({ "drill/log.shp": shp, "drill/log.prj": prj })));
    expect(log.longitude[0]).toBeCloseTo(longitude, 8);
    expect(log.latitude[0]).toBeCloseTo(latitude, 8);
    expect(notes).toEqual([]);
  });

  it("says when a .prj stands on a datum whose shift it does not know", async () => {
    const { prj, east, north, longitude, latitude } = OLD_DATUM;
    const shp = makeShp([
      [east, north],
      [east, north],
      [east, north],
    ]);
    const { log, notes } = await readAsProposed(source(layer({ "drill/log.shp": shp, "drill/log.prj": prj })));
    expect(notes.map((note) => note.code)).toEqual(["old-datum"]);
    // It is off, and less than 300 m: 0.004 degrees.
    expect(Math.abs((log.longitude[0] ?? NaN) - longitude)).toBeLessThan(0.004);
    expect(Math.abs((log.latitude[0] ?? NaN) - latitude)).toBeGreaterThan(1e-4);
  });

  it("says when there is no .prj, and offers easting and northing where the numbers are metres", async () => {
    const bare = { "drill/log.shp": makeShp(POINTS), "drill/log.dbf": makeDbf(COLUMNS) };
    expect((await mustInspect(source(bare))).notes.map((note) => note.code)).toEqual(["no-projection"]);
    const metres = { ...bare, "drill/log.shp": makeShp(POINTS.map(([x, y]) => [x * 1e4, y * 1e5])) };
    const inspection = await mustInspect(source(metres));
    expect(inspection.columns.slice(0, 2).map((column) => column.proposal?.channel)).toEqual(["easting", "northing"]);
  });

  it("reads what both parts hold when they disagree, with a note", async () => {
    const { log, notes } = await readAsProposed(source(layer({ "drill/log.shp": makeShp(POINTS.slice(0, 2)) })));
    expect(log.records).toBe(2);
    expect(notes).toMatchObject([{ code: "part-count-mismatch", count: 1 }]);
    const cut = await readAsProposed(source(layer({ "drill/log.shp": makeShp(POINTS).subarray(0, 150) })));
    expect(cut.log.records).toBe(1);
    expect(cut.notes.map((note) => note.code)).toEqual(["part-count-mismatch", "cut-short"]);
  });

  it("leaves deleted records out, with a note", async () => {
    const { log, notes } = await readAsProposed(source(layer({ "drill/log.dbf": makeDbf(COLUMNS, { deleted: [1] }) })));
    expect([...log.sourceLine]).toEqual([1, 3]);
    expect(notes).toMatchObject([{ code: "deleted-records", count: 1, firstLine: 2 }]);
  });

  // Bytes of the code pages as Python 3.11's codecs give them: "Pří".encode("cp1250"), "Поле".encode("cp866"), "ě".encode("utf-8").
  it.each([
    ["cp1250", [0x50, 0xf8, 0xed], "Pří"],
    ["1250", [0x50, 0xf8, 0xed], "Pří"],
    ["ANSI 1250", [0x50, 0xf8, 0xed], "Pří"],
    ["866", [0x8f, 0xae, 0xab, 0xa5], "Поле"],
    ["OEM 866", [0x8f, 0xae, 0xab, 0xa5], "Поле"],
    ["ISO 8859-2", [0xec], "ě"],
    ["ISO 88592", [0xec], "ě"],
    ["88592", [0xec], "ě"],
    ["UTF-8", [0xc4, 0x9b], "ě"],
    ["65001", [0xc4, 0x9b], "ě"],
  ])("reads names and texts by a .cpg of %s", async (cpg, bytes, text) => {
    const raw = String.fromCharCode(...bytes);
    const named: DbfColumn[] = [
      { ...(COLUMNS[1] as DbfColumn), name: `N_${raw}` },
      { name: "NOTE", type: "C", length: 12, cells: [raw, raw, raw] },
    ];
    const inspection = await mustInspect(source(layer({ "drill/log.dbf": makeDbf(named), "drill/log.cpg": cpg })));
    expect(inspection.columns[2]?.name).toBe(`N_${text}`);
    expect(inspection.columns[3]?.sample[0]).toBe(text);
    expect(inspection.notes.map((note) => note.code)).not.toContain("unknown-code-page");
  });

  it("without a .cpg goes by the language driver, else by whether the texts are UTF-8", async () => {
    const names = async (raw: string, driver = 0) => {
      const dbf = makeDbf([{ ...(COLUMNS[1] as DbfColumn), name: raw }]);
      dbf[29] = driver;
      return (await mustInspect(source(layer({ "drill/log.dbf": dbf })))).columns[2]?.name;
    };
    expect(await names("\u008f\u00ae", 0x65)).toBe("По");
    expect(await names("P\u00f8", 0xc8)).toBe("Př");
    expect(await names("D\u00e9bit")).toBe("Débit");
    expect(await names("D\u00c3\u00a9bit")).toBe("Débit");
  });

  it("says when a .cpg names a page it does not know", async () => {
    const inspection = await mustInspect(source(layer({ "drill/log.cpg": "OEM 437" })));
    expect(inspection.notes.map((note) => note.code)).toContain("unknown-code-page");
    const { log } = await readAsProposed(source(layer({ "drill/log.cpg": "OEM 437" })));
    expect(log.records).toBe(3);
  });

  it("reads names in the encoding of the .cpg", async () => {
    const named = [{ ...(COLUMNS[1] as DbfColumn), name: "D\u00e9bit_N" }];
    const files = layer({ "drill/log.dbf": makeDbf(named), "drill/log.cpg": "1252" });
    expect((await mustInspect(source(files))).columns[2]?.name).toBe("Débit_N");
  });

  it.each([
    ["several-layers", layer({ "other/two.shp": makeShp(POINTS), "other/two.dbf": makeDbf(COLUMNS) })],
    ["missing-part", { "log.shp": makeShp(POINTS) }],
    ["unknown-file-kind", { "readme.txt": "nothing here" }],
    ["no-readings", { "TASKDATA/TASKDATA.XML": "<ISO11783_TaskData/>" }],
    ["not-points", layer({ "drill/log.shp": makeShp(POINTS, 31) })],
    ["shapefile-damaged", layer({ "drill/log.shp": makeShp(POINTS, 5) })],
    ["shapefile-damaged", layer({ "drill/log.shp": new Uint8Array(200) })],
    ["shapefile-damaged", layer({ "drill/log.dbf": new Uint8Array(200) })],
    ["unknown-projection", layer({ "drill/log.prj": 'PROJCS["Somewhere",PROJECTION["Unheard_Of"]]' })],
    ["no-readings", layer({ "drill/log.shp": makeShp([]) })],
    ["archive-unsafe-name", layer({ "../outside.txt": "x" })],
    ["archive-unsafe-name", layer({ "a\\..\\b.txt": "x" })],
    ["archive-unsafe-name", layer({ "/etc/x": "x" })],
    ["archive-bomb", layer({ "zeros.bin": new Uint8Array(40 * 1024 * 1024) })],
    ["archive-bomb", Object.fromEntries(Array.from({ length: 1100 }, (_, i) => [`f${i}.txt`, "x"]))],
  ])("stops with %s", async (code, files) => {
    const error = await errorOf(source(files));
    expect(error?.code).toBe(code);
    expect(error?.message.length).toBeGreaterThan(40);
  });

  it("stops at a password and at the 64-bit form, before unpacking", async () => {
    const zip = zipOf(layer());
    // Entry of the list at the end: signature 0x02014b50, flags at 8, unpacked size at 24 (.ZIP File Format Specification, 4.3.12).
    const entryAt = zip.findIndex(
      (_, at) => zip[at] === 0x50 && zip[at + 1] === 0x4b && zip[at + 2] === 1 && zip[at + 3] === 2,
    );
    const locked = zip.slice();
    locked[entryAt + 8] = (locked[entryAt + 8] ?? 0) | 1;
    expect((await errorOf(bytesSource("log.zip", locked)))?.code).toBe("archive-encrypted");
    const large = zip.slice().fill(0xff, entryAt + 24, entryAt + 28);
    expect((await errorOf(bytesSource("log.zip", large)))?.code).toBe("file-too-large");
  });

  it("does not trust the sizes the list states", async () => {
    const zip = zipOf(layer());
    const entryAt = zip.findIndex(
      (_, at) => zip[at] === 0x50 && zip[at + 1] === 0x4b && zip[at + 2] === 1 && zip[at + 3] === 2,
    );
    const grown = zip.slice();
    new DataView(grown.buffer).setUint32(entryAt + 24, 5000, true);
    expect((await errorOf(bytesSource("log.zip", grown)))?.code).toBe("archive-damaged");
  });

  it("stops with archive-truncated at any cut", async () => {
    const zip = zipOf(layer());
    for (const share of [0.1, 0.5, 0.9, 0.99]) {
      const error = await errorOf(bytesSource("log.zip", zip.subarray(0, Math.floor(zip.length * share))));
      expect(error?.code).toBe("archive-truncated");
    }
  });
});

describe("shapefile of lines, areas and multipoints", () => {
  const strip = (x: number): [number, number][] => [
    [x, 38.4],
    [x, 38.42],
    [x + 0.02, 38.42],
    [x + 0.02, 38.4],
    [x, 38.4],
  ];
  // Centres worked by hand.
  it.each([
    ["area-centres", makeManyPointShp([[strip(-98.62)], [strip(-98.6)], [strip(-98.58)]], 5), [-98.61, -98.59, -98.57]],
    [
      "several-points",
      makeManyPointShp(
        [-98.62, -98.6, -98.58].map((x) => [
          [
            [x, 38.4],
            [x + 0.02, 38.42],
          ],
        ]),
        8,
      ),
      [-98.61, -98.59, -98.57],
    ],
    [
      "line-midpoints",
      makeManyPointShp(
        [-98.62, -98.6, -98.58].map((x) => [
          [
            [x, 38.41],
            [x + 0.005, 38.41],
            [x + 0.02, 38.41],
          ],
        ]),
        3,
      ),
      [-98.61, -98.59, -98.57],
    ],
  ] as const)("%s", async (code, shp, longitudes) => {
    const { log, notes } = await readAsProposed(source(layer({ "drill/log.shp": shp })));
    longitudes.forEach((longitude, record) => expect(log.longitude[record]).toBeCloseTo(longitude, 9));
    expect(log.latitude[0]).toBeCloseTo(38.41, 9);
    expect(notes.map((note) => note.code)).toEqual([code]);
  });

  it("stops at counts that do not fit the record", async () => {
    const shp = makeManyPointShp([[strip(-98.62)]], 5);
    new DataView(shp.buffer).setInt32(100 + 8 + 40, 9999, true);
    expect(await errorOf(source(layer({ "drill/log.shp": shp })))).toMatchObject({
      code: "shapefile-damaged",
      line: 1,
    });
  });
});

describe("several layers in one zip", () => {
  const two = layer({
    "west/log.shp": makeShp(POINTS.slice(0, 1)),
    "west/log.dbf": makeDbf([{ name: "DEPTH_mm", type: "N", length: 4, cells: ["52"] }]),
    "west/log.prj": WGS84_PRJ,
    "bare.shp": makeShp(POINTS),
  });

  it("are offered, the longest first, each with its own columns; what has no table is said", async () => {
    const inspection = await mustInspect(source(two));
    expect(inspection.layers?.map(({ id, records, shape }) => [id, records, shape])).toEqual([
      ["drill/log", 3, "wide"],
      ["west/log", 1, "single"],
    ]);
    expect(inspection.layers?.[1]?.columns.map((column) => column.name)).toContain("DEPTH_mm");
    expect(inspection.notes.map((note) => note.code)).toEqual(["several-layers", "shapes-without-table"]);
  });

  it("are read by choice, and no recipe is applied before the choice", async () => {
    const inspection = await mustInspect(source(two));
    const { mapping } = proposeMapping(inspection);
    expect(mappingFits(mapping, inspection)).toBe(false);
    expect(mappingFits({ ...mapping, layer: "drill/log" }, inspection)).toBe(true);
    expect((await errorOf(source(two), mapping))?.code).toBe("several-layers");
    const { log } = await mustRead(source(two), {
      shape: "single",
      layer: "west/log",
      columns: [
        { name: "point longitude", channel: "longitude", unit: "deg" },
        { name: "point latitude", channel: "latitude", unit: "deg" },
        { name: "DEPTH_mm", channel: "depth", unit: "mm" },
      ],
    });
    expect([...(log.channels[0]?.values ?? [])]).toEqual([Math.fround(0.052)]);
  });
});
