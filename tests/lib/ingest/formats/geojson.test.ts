import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { readLog } from "@/lib/ingest";
import { bytesSource } from "@/lib/ingest/byte-source";
import type { LogMapping } from "@/lib/ingest/mapping";
import { errorOf, mustInspect, mustRead, readAsProposed, textSource } from "@/tests/lib/ingest/support/make-source";

interface Point {
  type: "Feature";
  geometry: unknown;
  properties: Record<string, unknown> | null;
}

function point(longitude: number, latitude: number, properties: Record<string, unknown>): Point {
  return { type: "Feature", geometry: { type: "Point", coordinates: [longitude, latitude] }, properties };
}

const FEATURES = [
  point(-98.61, 38.41, { "DF_1 (N)": 900, "DF_2 (N)": 910.5, note: 'a "}" in ] text' }),
  point(-98.62, 38.42, { "DF_2 (N)": null, "DF_1 (N)": "905" }),
];
const COLLECTION = { type: "FeatureCollection", features: FEATURES };
const source = (value: unknown, space?: number) => textSource(JSON.stringify(value, null, space), "log.geojson");

describe("GeoJSON points", () => {
  it("takes longitude first (RFC 7946 section 4) and properties by name in any order", async () => {
    const { log, notes } = await readAsProposed(source(COLLECTION));
    expect([...log.longitude]).toEqual([-98.61, -98.62]);
    expect([...log.latitude]).toEqual([38.41, 38.42]);
    expect([...(log.channels[0]?.values ?? [])]).toEqual([900, 910.5, 905, NaN]);
    expect([...log.sourceLine]).toEqual([1, 2]);
    expect(notes).toEqual([]);
  });

  it.each([
    ["indented", source(COLLECTION, 2)],
    [
      "members after the features",
      source({ features: FEATURES, name: "features", type: "FeatureCollection", extra: [{ a: [1] }] }),
    ],
    [
      "a member before them that looks alike",
      source({ bbox: [1], a: { features: [{ x: 1 }] }, type: "features", features: FEATURES }),
    ],
    ["a byte-order mark", textSource(`\uFEFF${JSON.stringify(COLLECTION)}`, "log.json")],
    [
      "a third coordinate",
      source({
        ...COLLECTION,
        features: FEATURES.map((f, i) => ({
          ...f,
          geometry: { type: "Point", coordinates: [-98.61 - i * 0.01, 38.41 + i * 0.01, 455] },
        })),
      }),
    ],
  ])("%s reads the same", async (_, changed) => {
    const { log } = await readAsProposed(changed);
    expect([...(log.channels[0]?.values ?? [])]).toEqual([900, 910.5, 905, NaN]);
    expect(log.longitude[1]).toBeCloseTo(-98.62, 10);
  });

  it("gives the values of a list a row each", async () => {
    const features = [point(-98.6, 38.4, { depth_mm: [40, 41, 42] }), point(-98.6, 38.5, { depth_mm: [43, null, 45] })];
    const { log } = await readAsProposed(source({ type: "FeatureCollection", features }));
    expect(log.rows).toBe(3);
    expect([...(log.channels[0]?.values ?? [])].map((m) => Math.round(m * 1000))).toEqual([40, 41, 42, 43, NaN, 45]);
  });

  it("keeps a record without geometry, with a note", async () => {
    const features = [...FEATURES, { type: "Feature", geometry: null, properties: { "DF_1 (N)": 1 } }];
    const { log, notes } = await readAsProposed(source({ type: "FeatureCollection", features }));
    expect(log.records).toBe(3);
    expect(log.longitude[2]).toBeNaN();
    expect(notes.map((note) => [note.code, note.firstLine])).toEqual([
      ["null-geometry", 3],
      ["no-position", 3],
    ]);
  });

  it("reads coordinates of a named system as easting and northing", async () => {
    // PROJ 9: `echo "40 -100" | cs2cs EPSG:4326 EPSG:32614`.
    const features = [point(414639.538157, 4428236.064633, { "DF_1 (N)": 1 })];
    const crs = { type: "name", properties: { name: "urn:ogc:def:crs:EPSG::32614" } };
    const file = source({ type: "FeatureCollection", crs, features });
    const inspection = await mustInspect(file);
    expect(inspection.crs).toBe("EPSG:32614");
    expect(inspection.columns.slice(0, 2).map((column) => column.proposal?.channel)).toEqual(["easting", "northing"]);
    const { log } = await mustRead(file, {
      shape: "single",
      crs: inspection.crs,
      columns: [
        { name: "point x", channel: "easting", unit: "m" },
        { name: "point y", channel: "northing", unit: "m" },
      ],
    });
    expect(log.latitude[0]).toBeCloseTo(40, 8);
  });

  it("reads the common feature from its bytes and any other by JSON.parse to the same log", async () => {
    const value = fc.oneof(
      fc.integer({ min: -1e6, max: 1e6 }),
      fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e4, max: 1e4 }),
      fc.constantFrom(null, true, "12.5", "x", "", "µ", -0.5, 0, 1e21, 1e-7, "1948025100"),
    );
    const features = fc.array(
      fc.record({ "DF_1 (N)": value, "DF_2 (N)": value, t: value, other: value }, { requiredKeys: [] }),
      {
        minLength: 1,
        maxLength: 12,
      },
    );
    const columns: LogMapping["columns"] = [
      { name: "point longitude", channel: "longitude", unit: "deg" },
      { name: "point latitude", channel: "latitude", unit: "deg" },
      { name: "t", channel: "time", unit: "unix-s" },
      { name: "DF_1 (N)", channel: "downforce", row: 1, unit: "N" },
      { name: "DF_2 (N)", channel: "downforce", row: 2, unit: "N" },
    ];
    const first = { "DF_1 (N)": 1, "DF_2 (N)": 2, t: 3, other: 4 };
    await fc.assert(
      fc.asyncProperty(features, fc.boolean(), async (list, isReversed) => {
        const build = (extra: Record<string, unknown>) =>
          [first, ...list].map((properties, i) => {
            const entries = Object.entries(properties);
            if (isReversed) entries.reverse();
            return point(-98.6, 38 + i / 100, { ...Object.fromEntries(entries), ...extra });
          });
        const flat = await readLog(source({ features: build({}) }), { shape: "wide", columns });
        // A nested member sends every feature to JSON.parse.
        const nested = await readLog(source({ features: build({ nested: { a: 1 } }) }), { shape: "wide", columns });
        expect(flat).toEqual(nested);
      }),
      { numRuns: 200 },
    );
  });

  it("gives the same log however the bytes are cut into chunks", async () => {
    const bytes = new TextEncoder().encode(JSON.stringify(COLLECTION));
    const whole = await readAsProposed(source(COLLECTION));
    await fc.assert(
      fc.asyncProperty(fc.integer({ min: 1, max: bytes.length }), async (chunkBytes) => {
        expect(await readAsProposed(bytesSource("log.geojson", bytes, chunkBytes))).toEqual(whole);
      }),
      { numRuns: 60 },
    );
  });

  it.each([
    [
      "not-points",
      source({
        type: "FeatureCollection",
        features: [{ ...FEATURES[0], geometry: { type: "GeometryCollection", geometries: [] } }],
      }),
    ],
    ["no-readings", source({ type: "FeatureCollection", features: [] })],
    ["not-a-log", source({ readings: [1, 2, 3] })],
    ["json-damaged", textSource(JSON.stringify(COLLECTION).slice(0, -40), "log.geojson")],
    ["json-damaged", textSource('{"type":"FeatureCollection","features":[{"type":Feature}]}', "log.geojson")],
  ])("stops with %s", async (code, file) => {
    expect((await errorOf(file))?.code).toBe(code);
  });

  it("names the feature whose latitude is beyond 90", async () => {
    const swapped = source({
      type: "FeatureCollection",
      features: [FEATURES[0], point(38.4, -98.6, { "DF_1 (N)": 1 })],
    });
    const outcome = await readLog(swapped, {
      shape: "single",
      columns: [
        { name: "point longitude", channel: "longitude", unit: "deg" },
        { name: "point latitude", channel: "latitude", unit: "deg" },
      ],
    });
    expect(outcome).toMatchObject({ ok: false, error: { code: "latitude-out-of-range", line: 2 } });
  });
});

describe("GeoJSON lines and areas that carry readings", () => {
  const withGeometry = (geometry: unknown) =>
    source({ type: "FeatureCollection", features: FEATURES.map((feature) => ({ ...feature, geometry })) });
  const square = (x: number, y: number, size: number) => [
    [x, y],
    [x + size, y],
    [x + size, y + size],
    [x, y + size],
    [x, y],
  ];

  // Worked by hand.
  it.each([
    ["area-centres", { type: "Polygon", coordinates: [square(-98.62, 38.4, 0.02)] }, [-98.61, 38.41]],
    // A square of 4 with a hole of 1 in its upper right: centre (4*1 - 1*1.5) / 3 from the corner, in hundredths.
    [
      "area-centres",
      {
        type: "Polygon",
        coordinates: [square(-98.62, 38.4, 0.02), [...square(-98.61, 38.41, 0.01)].reverse()],
      },
      [-98.62 + 0.025 / 3, 38.4 + 0.025 / 3],
    ],
    [
      "area-centres",
      { type: "MultiPolygon", coordinates: [[square(-98.62, 38.4, 0.01)], [square(-98.6, 38.4, 0.01)]] },
      [-98.605, 38.405],
    ],
    [
      "area-centres",
      {
        type: "Polygon",
        coordinates: [
          [
            [179.9, 10],
            [-179.9, 10],
            [-179.9, 10.2],
            [179.9, 10.2],
            [179.9, 10],
          ],
        ],
      },
      [180, 10.1],
    ],
    [
      "line-midpoints",
      {
        type: "LineString",
        coordinates: [
          [-98.62, 38.4, 450],
          [-98.61, 38.4, 451],
          [-98.61, 38.43, 452],
        ],
      },
      [-98.61, 38.41],
    ],
    [
      "line-midpoints",
      {
        type: "MultiLineString",
        coordinates: [
          [
            [0, 0],
            [1, 1],
          ],
          [
            [-98.62, 38.4],
            [-98.61, 38.4],
            [-98.6, 38.4],
          ],
        ],
      },
      [-98.61, 38.4],
    ],
    [
      "several-points",
      {
        type: "MultiPoint",
        coordinates: [
          [-98.62, 38.4],
          [-98.6, 38.42],
        ],
      },
      [-98.61, 38.41],
    ],
  ])("%s", async (code, geometry, [longitude, latitude]) => {
    const { log, notes } = await readAsProposed(withGeometry(geometry));
    expect(log.longitude[1]).toBeCloseTo(longitude ?? NaN, 9);
    expect(log.latitude[1]).toBeCloseTo(latitude ?? NaN, 9);
    expect(notes.map((note) => [note.code, note.count])).toEqual([[code, 2]]);
    expect([...(log.channels[0]?.values ?? [])]).toEqual([900, 910.5, 905, NaN]);
  });
});

describe("GeoJSON text sequences (RFC 8142)", () => {
  const [first, second] = FEATURES.map((feature) => JSON.stringify(feature));
  const texts: [string, string][] = [
    ["a record separator before each", `\u001e${first}\n\u001e${second}\n`],
    ["no separator, one a line", `${first}\n${second}\n`],
    [
      "a collection within",
      `\u001e${JSON.stringify({ ...COLLECTION, features: FEATURES.slice(0, 1) })}\n\u001e${second}\n`,
    ],
    [
      "spread over lines",
      `\u001e${JSON.stringify(FEATURES[0], null, 2)}\n\u001e${JSON.stringify(FEATURES[1], null, 2)}\n`,
    ],
  ];
  it.each(texts)("%s", async (_, text) => {
    for (const chunkBytes of [3, 1 << 16]) {
      const { log } = await readAsProposed(textSource(text, "log.geojsons", chunkBytes));
      expect([...log.longitude]).toEqual([-98.61, -98.62]);
      expect([...(log.channels[0]?.values ?? [])]).toEqual([900, 910.5, 905, NaN]);
    }
  });

  it("cut in the middle is damaged", async () => {
    expect((await errorOf(textSource(`\u001e${first}\n\u001e${second?.slice(0, 40)}`, "log.geojsons")))?.code).toBe(
      "json-damaged",
    );
  });
});
