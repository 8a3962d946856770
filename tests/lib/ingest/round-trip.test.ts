import { gzipSync, zipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { resolveChannel } from "@/lib/channels/resolve-channel";
import { bytesSource, type ByteSource } from "@/lib/ingest/byte-source";
import { proposeMapping } from "@/lib/ingest/propose-mapping";
import type { MachineLog } from "@/lib/logs/machine-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { layOutRows } from "@/lib/simulator/row-layout";
import { PER_SI_UNIT, type FileStyle } from "@/lib/simulator/writers/file-style";
import { writeLongCsv, writeWideCsv } from "@/lib/simulator/writers/write-csv";
import { writeGeoJson } from "@/lib/simulator/writers/write-geojson";
import { writeShapefileZip } from "@/lib/simulator/writers/write-shapefile";
import { writeTaskDataZip } from "@/lib/simulator/writers/write-task-data";
import { describeRows } from "@/lib/statistics/row-statistics";
import { mustInspect, mustRead, utf16 } from "@/tests/lib/ingest/support/make-source";
import { createFixtureLog } from "@/tests/support/fixture-logs";

const { log: simulated, truth } = createFixtureLog();
const { machine } = truth.options;
const encode = (text: string) => new TextEncoder().encode(text);

/** What a format cannot keep: half a step of each value, in newtons and metres. */
interface Rounding {
  forceN: number;
  depthM: number;
  /** Of longitude and latitude. Rounded places turn the machine a little at each record, and weights with it. */
  positionDecimals?: number;
  /** The format tells no heading: it comes from the places. */
  lacksHeading?: boolean;
  /** Channels the format has no place for. */
  lacks?: string[];
}
const PLAIN: Rounding = { forceN: 0.5, depthM: 0.00005 };
const POUNDS: Partial<FileStyle> = { force: "lbf", forceDecimals: 1, depth: "in", speed: "mph", naming: "short" };
const IN_POUNDS: Rounding = { forceN: 0.05 / PER_SI_UNIT.lbf, depthM: 0.0005 / PER_SI_UNIT.in };
const COMMA: Partial<FileStyle> = { delimiter: ";", decimalComma: true, byteOrderMark: true, newline: "\r\n" };

function taskData(): Uint8Array {
  const { offsetM, forwardM, spacingM } = layOutRows(machine);
  const geometry = { rowOffsetsM: offsetM, rowForwardM: forwardM, rowWidthM: spacingM };
  return writeTaskDataZip([{ designator: "East quarter, barley", log: simulated }], geometry);
}

/** One feature a line (RFC 8142, each led by a record separator). */
function sequence(): string {
  const { features } = JSON.parse(writeGeoJson(simulated)) as { features: unknown[] };
  return features.map((feature) => `\u001e${JSON.stringify(feature)}\n`).join("");
}

/** The card of a logger that begins a new file every hundred records. */
function card(): Uint8Array {
  const [header = "", ...lines] = writeWideCsv(simulated).trimEnd().split("\n");
  const files: Record<string, Uint8Array> = {};
  for (let from = 0; from < lines.length; from += 100) {
    files[`part-${from / 100 + 1}.csv`] = encode([header, ...lines.slice(from, from + 100)].join("\n"));
  }
  return zipSync(files);
}

const FORMATS: [string, ByteSource, Rounding][] = [
  ["wide CSV", bytesSource("a.csv", encode(writeWideCsv(simulated))), PLAIN],
  ["wide CSV in pounds and inches", bytesSource("a.csv", encode(writeWideCsv(simulated, POUNDS))), IN_POUNDS],
  ["long CSV", bytesSource("a.csv", encode(writeLongCsv(simulated, { naming: "short" }))), PLAIN],
  ["gzipped TSV", bytesSource("a.tsv.gz", gzipSync(encode(writeWideCsv(simulated, { delimiter: "\t" })))), PLAIN],
  ["UTF-16", bytesSource("a.csv", utf16(writeWideCsv(simulated))), PLAIN],
  ["decimal commas, CRLF and a byte-order mark", bytesSource("a.csv", encode(writeWideCsv(simulated, COMMA))), PLAIN],
  ["GeoJSON", bytesSource("a.geojson", encode(writeGeoJson(simulated))), PLAIN],
  ["a sequence of GeoJSON texts", bytesSource("a.geojsons", encode(sequence())), PLAIN],
  ["zipped shapefile", bytesSource("a.zip", writeShapefileZip(simulated, "seeding", { depth: "mm" })), PLAIN],
  ["a card full of CSV parts", bytesSource("a.zip", card()), PLAIN],
  // Downforce in whole newtons, depth in whole millimetres, places in 1e-7 degrees (11 mm); margin has no identifier.
  [
    "task data",
    bytesSource("a.zip", taskData()),
    { forceN: 0.5, depthM: 0.0005, positionDecimals: 7, lacksHeading: true, lacks: ["margin"] },
  ],
];

function rowsOf(log: MachineLog, id: string) {
  const built = buildLog(log, machine, { boundary: null, workingWidthM: null });
  if (!built.ok) throw new Error(built.error.message);
  const { placed } = built.value;
  const channel = resolveChannel(placed, id);
  return channel && describeRows(placed, channel, rowDistances(placed)).items;
}

/** The log with places and headings as a format can hold them: what the weights of its readings rest on. */
function placedAs({ positionDecimals = 8, lacksHeading = false }: Rounding): MachineLog {
  const { longitude, latitude, headingDeg } = simulated;
  const round = (values: Float64Array) => values.map((value) => Number(value.toFixed(positionDecimals)));
  return {
    ...simulated,
    longitude: round(longitude),
    latitude: round(latitude),
    headingDeg: lacksHeading ? null : headingDeg,
  };
}

async function readBack(source: ByteSource): Promise<MachineLog> {
  const { mapping, undecided } = proposeMapping(await mustInspect(source));
  expect(undecided).toEqual([]);
  // Task data tells the machine's own clock; the simulator's stood five hours behind UTC.
  return (await mustRead(source, { ...mapping, timeZone: mapping.timeZone ?? "America/Chicago" })).log;
}

describe.each(FORMATS)("the same log as %s", (_, source, rounding) => {
  it("gives the same statistics of every row, within what the format rounds away", async () => {
    const log = await readBack(source);
    expect(log).toMatchObject({ kind: "seeding", records: simulated.records, rows: simulated.rows });
    for (const { id } of simulated.channels.filter(({ perRow }) => perRow)) {
      const found = rowsOf(log, id);
      if (rounding.lacks?.includes(id)) {
        expect({ id, found }).toEqual({ id, found: null });
        continue;
      }
      const half = (id === "depth" ? rounding.depthM : rounding.forceN) * 1.001;
      const expected = rowsOf(placedAs(rounding), id) ?? [];
      expect(found).toHaveLength(expected.length);
      expected.forEach((row, index) => {
        const other = found?.[index];
        expect([id, other?.row, other?.n]).toEqual([id, row.row, row.n]);
        expect(Math.abs((other?.distanceM ?? NaN) / row.distanceM - 1)).toBeLessThan(1e-5);
        for (const name of ["mean", "sd", "min", "p05", "p50", "p95", "max"] as const) {
          const difference = Math.abs((other?.[name] ?? NaN) - (row[name] ?? NaN));
          expect({ id, name, row: row.row, isNear: difference <= half * 1.01 }).toMatchObject({ isNear: true });
        }
        expect(other?.flagged).toBe(row.flagged);
      });
    }
  });
});
