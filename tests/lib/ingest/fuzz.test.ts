import { readdirSync, readFileSync } from "node:fs";
import { gzipSync } from "fflate";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { inspectLog, readLog } from "@/lib/ingest";
import { bytesSource } from "@/lib/ingest/byte-source";
import { INGEST_ERROR_CODES } from "@/lib/ingest/ingest-error";
import type { LogMapping } from "@/lib/ingest/mapping";
import { proposeMapping } from "@/lib/ingest/propose-mapping";
import { SIMPLE_HEADER, SIMPLE_MAPPING } from "./support/make-source";
import { makeDbf, makeShp, WGS84_PRJ, zipOf } from "./support/make-shapefile";

const encode = (text: string) => new TextEncoder().encode(text);
const CSV = encode(
  `${SIMPLE_HEADER}\n${Array.from({ length: 12 }, (_, i) => `${i},-98.6${i},38.4,2${i}.5,"21${i}"`).join("\n")}\n`,
);
const GEOJSON = encode(
  JSON.stringify({
    type: "FeatureCollection",
    features: Array.from({ length: 6 }, (_, i) => ({
      type: "Feature",
      geometry: { type: "Point", coordinates: [-98.6, 38.4 + i / 1000] },
      properties: { DF_1_N: 900 + i, DF_2_N: 800, t: i },
    })),
  }),
);
const SHAPEFILE = zipOf({
  "a.shp": makeShp([[-98.6, 38.4], [-98.6, 38.5], null]),
  "a.dbf": makeDbf([
    { name: "DF_1_N", type: "N", length: 6, cells: ["1", "2", "3"] },
    { name: "DF_2_N", type: "N", length: 6, cells: ["4", "5", "6"] },
  ]),
  "a.prj": WGS84_PRJ,
});

const TASK_DATA = zipOf({
  "TASKDATA/TASKDATA.XML":
    '<ISO11783_TaskData><DVC A="DVC-1" B="Drill"><DET A="DET-1" B="1" C="1" E="0" F="0"/></DVC><TSK A="TSK-1"><TLG A="TLG00001" C="1"/></TSK></ISO11783_TaskData>',
  "TASKDATA/TLG00001.XML": '<TIM A="" D="4"><PTN A="" B="" D=""/><DLV A="01AB" B="" C="DET-1"/></TIM>',
  // Two records of 21 bytes: time, north, east, status, one value (ISO 11783-10 annex D).
  "TASKDATA/TLG00001.BIN": Uint8Array.from(
    Array.from({ length: 2 }, () => "e210ec024d3fc7ecbc18c79535c80401005804000".padEnd(42, "0").match(/../g) ?? [])
      .flat()
      .map((pair) => parseInt(pair, 16)),
  ),
});

const FILES: [string, Uint8Array][] = [
  ["log.csv", CSV],
  ["log.csv.gz", gzipSync(CSV, { mtime: 0 })],
  ["log.geojson", GEOJSON],
  ["log.zip", SHAPEFILE],
  ["tasks.zip", TASK_DATA],
];

/** A few hundred in every test run; `FUZZ_RUNS=10000` for the long one. */
const RUNS = Number(process.env.FUZZ_RUNS ?? 250);
const LONGEST_MS = 10_000 + RUNS * 60;

/** Some bytes changed, then perhaps cut: what a bad disk, a bad line or a bad person makes of a file. */
const damage = fc.record({
  flips: fc.array(fc.tuple(fc.nat(), fc.nat(255)), { maxLength: 6 }),
  keep: fc.oneof(fc.constant(1), fc.double({ min: 0, max: 1, noNaN: true })),
  chunkBytes: fc.constantFrom(7, 100, 1 << 16),
});

async function outcomesOf(name: string, bytes: Uint8Array, chunkBytes: number) {
  const source = bytesSource(name, bytes, chunkBytes);
  const inspected = await inspectLog(source);
  const proposed = inspected.ok ? proposeMapping(inspected.value).mapping : SIMPLE_MAPPING;
  const mapping: LogMapping = { ...proposed, timeZone: "America/Chicago" };
  return [inspected, await readLog(source, mapping)] as const;
}

describe.each(FILES)("a damaged %s", (name, whole) => {
  it(
    "always ends in a log or in an error that says what and where",
    async () => {
      await fc.assert(
        fc.asyncProperty(damage, async ({ flips, keep, chunkBytes }) => {
          const bytes = whole.slice(0, Math.ceil(whole.length * keep));
          for (const [at, value] of flips) if (bytes.length > 0) bytes[at % bytes.length] = value;
          for (const outcome of await outcomesOf(name, bytes, chunkBytes)) {
            if (outcome.ok) continue;
            expect(INGEST_ERROR_CODES).toContain(outcome.error.code);
            // "unreadable" is for what lies outside the file: damage inside it must be told by its own rule.
            expect(outcome.error.code, outcome.error.message).not.toBe("unreadable");
            expect(outcome.error.message).toMatch(/\.$/);
          }
        }),
        { numRuns: RUNS },
      );
    },
    LONGEST_MS,
  );

  it("reads whole", async () => {
    const [, outcome] = await outcomesOf(name, whole, 1 << 16);
    expect(outcome.ok).toBe(true);
  });
});

describe("bytes of any kind", () => {
  it(
    "never throw",
    async () => {
      await fc.assert(
        fc.asyncProperty(
          fc.uint8Array({ maxLength: 400 }),
          fc.constantFrom("a.csv", "a.zip", "a.json"),
          async (bytes, name) => {
            for (const outcome of await outcomesOf(name, bytes, 50)) {
              if (!outcome.ok) expect(outcome.error.code, outcome.error.message).not.toBe("unreadable");
            }
          },
        ),
        { numRuns: RUNS },
      );
    },
    LONGEST_MS,
  );
});

const FIXTURES = readdirSync("fixtures/logs", { recursive: true, encoding: "utf8" }).filter((path) =>
  /input\.\w+$/.test(path),
);

describe("every fixture with bytes changed or cut off", () => {
  it.each(FIXTURES)(
    "%s ends in a log or in an error of its own rule",
    async (path) => {
      const whole = readFileSync(`fixtures/logs/${path}`);
      // Large files a few times, small ones more often.
      const rounds = Math.ceil(Math.min(RUNS / 10, 2_000_000 / (whole.length + 1_000)));
      await fc.assert(
        fc.asyncProperty(damage, async ({ flips, keep }) => {
          const bytes = Uint8Array.from(whole.subarray(0, Math.ceil(whole.length * keep)));
          for (const [at, value] of flips) if (bytes.length > 0) bytes[at % bytes.length] = value;
          for (const outcome of await outcomesOf(path, bytes, 1 << 16)) {
            if (!outcome.ok) expect(outcome.error.code, outcome.error.message).not.toBe("unreadable");
          }
        }),
        { numRuns: rounds },
      );
    },
    LONGEST_MS,
  );
});
