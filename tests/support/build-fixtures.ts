import { strToU8, zipSync } from "fflate";
import { keepFirstRecords } from "@/lib/simulator/benchmark-log";
import { layOutRows } from "@/lib/simulator/row-layout";
import type { SimulatedLog } from "@/lib/simulator/simulate-seeding-log";
import { simulateHarvestLog } from "@/lib/simulator/simulate-harvest-log";
import { LARKSPUR_COMBINE } from "@/lib/simulator/scenario/larkspur-machines";
import { createLocalPlane } from "@/lib/geo/local-plane";
import { rectangleRing } from "@/lib/simulator/field-ring";
import { writeLongCsv, writeWideCsv } from "@/lib/simulator/writers/write-csv";
import { writeGeoJson } from "@/lib/simulator/writers/write-geojson";
import { writeShapefileZip } from "@/lib/simulator/writers/write-shapefile";
import { writeTaskDataZip } from "@/lib/simulator/writers/write-task-data";
import { buildBadFixtures } from "@/tests/support/build-bad-fixtures";
import { createFixtureLog, describeFixtureTruth } from "@/tests/support/fixture-logs";

export interface Fixture {
  /** Folder under `fixtures/logs`. */
  folder: string;
  fileName: string;
  content: string | Uint8Array;
  /** One line for `fixtures/README.md`. */
  story: string;
  /** `truth.json` beside it; null where the file is only there to be refused or noted. */
  truth: string | null;
}

/** Every file under `fixtures/logs`, made from the simulator alone. */
export function buildFixtures(): Fixture[] {
  const simulated = createFixtureLog();
  const truth = describeFixtureTruth(simulated);
  const { log } = simulated;
  const good = (folder: string, fileName: string, content: string | Uint8Array, story: string): Fixture => ({
    folder,
    fileName,
    content,
    story,
    truth,
  });
  return [
    good("csv/wide-newtons", "input.csv", writeWideCsv(log), "one line a record, plain words, newtons, millimetres"),
    good(
      "csv/wide-pounds",
      "input.csv",
      writeWideCsv(log, { ...POUNDS, unexplainedColumn: "AUX_3" }),
      "short names, pounds-force, inches, miles an hour, and a column of unknown meaning",
    ),
    good(
      "csv/wide-decimal-comma",
      "input.csv",
      writeWideCsv(log, DECIMAL_COMMA),
      "semicolons, decimal commas, byte-order mark, CRLF, unix seconds, decanewtons, centimetres, km/h",
    ),
    good("csv/long-newtons", "input.csv", writeLongCsv(log, { naming: "short" }), "one line a record and row"),
    good(
      "csv/card-of-parts",
      "input.zip",
      zipParts(writeWideCsv(log)),
      "zip of three CSV parts, named in another order than they were logged, one of them twice, and an empty one",
    ),
    good("geojson/points", "input.geojson", writeGeoJson(log, POUNDS), "one point feature a record"),
    good(
      "shapefile/points",
      "input.zip",
      writeShapefileZip(log, "seeding", { force: "N", depth: "mm" }),
      "zipped point shapefile with .shp, .shx, .dbf, .prj and .cpg",
    ),
    good(
      "iso11783/one-task",
      "input.zip",
      writeTaskDataZip([{ designator: "East quarter, barley", log }], rowsOf(simulated)),
      "ISO 11783-10 task data: one task, rows described by their offsets, clock five hours behind UTC, no margin",
    ),
    good(
      "iso11783/several-tasks",
      "input.zip",
      writeTaskDataZip(
        [
          { designator: "West quarter, barley", log: keepFirstRecords(log, 60) },
          { designator: "East quarter, barley", log },
        ],
        { ...rowsOf(simulated), letterCase: "lower", rowOrder: [5, 1, 8, 2, 7, 3, 6, 4], withMargin: true },
      ),
      "two tasks to choose from, small letters, rows listed out of order, margin under a maker's own identifier",
    ),
    harvestFixture(),
    ...buildBadFixtures(log),
  ];
}

/** As a card copied by hand holds them: parts by name in no order, a copy, and one begun when nothing was logged. */
function zipParts(text: string): Uint8Array {
  const [header = "", ...lines] = text.trimEnd().split("\n");
  const part = (from: number, to?: number) => strToU8(`${[header, ...lines.slice(from, to)].join("\n")}\n`);
  const files = {
    "CARD/a.csv": part(100, 180),
    "CARD/b.csv": part(0, 100),
    "CARD/b (copy).csv": part(0, 100),
    "CARD/c.csv": part(180),
    "CARD/d.csv": strToU8(`${header}\n`),
  };
  return zipSync(files, { mtime: new Date(1980, 0, 1) });
}

function rowsOf({ truth }: SimulatedLog): { rowOffsetsM: Float64Array; rowForwardM: Float64Array; rowWidthM: number } {
  const { offsetM, forwardM, spacingM } = layOutRows(truth.options.machine);
  return { rowOffsetsM: offsetM, rowForwardM: forwardM, rowWidthM: spacingM };
}

const POUNDS = { naming: "short", force: "lbf", depth: "in", speed: "mph", forceDecimals: 1 } as const;
const DECIMAL_COMMA = {
  delimiter: ";",
  decimalComma: true,
  byteOrderMark: true,
  newline: "\r\n",
  time: "unix-s",
  force: "daN",
  forceDecimals: 1,
  depth: "cm",
  speed: "km/h",
} as const;

function harvestFixture(): Fixture {
  const origin: [number, number] = [-98.6124, 38.4171];
  const ring = rectangleRing(createLocalPlane(...origin), 0, 120, 5 * LARKSPUR_COMBINE.headerWidthM);
  const { log, truth } = simulateHarvestLog({ seed: 7101, combine: LARKSPUR_COMBINE, origin, ring, headlandM: 10 });
  const facts = { kind: log.kind, records: log.records, combine: truth.options.combine, passes: truth.passes };
  return {
    folder: "csv/harvest",
    fileName: "input.csv",
    content: writeWideCsv(log),
    story: "harvest log: grain flow, moisture and cut width, one value a record",
    truth: JSON.stringify({ ...facts, lines: truth.lines }, null, 2) + "\n",
  };
}
