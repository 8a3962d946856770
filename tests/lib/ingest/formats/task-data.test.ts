import { ISOXMLManager, type ExtendedTimeLog, type Task } from "isoxml";
import { unzipSync, zipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { inspectLog, readLog } from "@/lib/ingest";
import { bytesSource } from "@/lib/ingest/byte-source";
import { readTimeLogHeader } from "@/lib/ingest/formats/task-data/read-time-log-header";
import { countRecords, scanTimeLog } from "@/lib/ingest/formats/task-data/scan-time-log";
import type { LogMapping } from "@/lib/ingest/mapping";
import { proposeMapping } from "@/lib/ingest/propose-mapping";
import type { MachineLog } from "@/lib/logs/machine-log";
import { layOutRows } from "@/lib/simulator/row-layout";
import { writeTaskDataZip, type TaskDataStyle } from "@/lib/simulator/writers/write-task-data";
import { createFixtureLog } from "@/tests/support/fixture-logs";
import { errorOf, mustInspect, mustRead } from "@/tests/lib/ingest/support/make-source";
import { zipOf } from "@/tests/lib/ingest/support/make-shapefile";

const { log: simulated, truth } = createFixtureLog();
const layout = layOutRows(truth.options.machine);
const GEOMETRY = { rowOffsetsM: layout.offsetM, rowForwardM: layout.forwardM };
const written = (style: Partial<TaskDataStyle> = {}) =>
  writeTaskDataZip([{ designator: "East quarter, barley", log: simulated }], { ...GEOMETRY, ...style });
const source = (bytes: Uint8Array) => bytesSource("tasks.zip", bytes);
const CHICAGO = { timeZone: "America/Chicago" };

async function proposed(bytes: Uint8Array): Promise<LogMapping> {
  return { ...proposeMapping(await mustInspect(source(bytes))).mapping, ...CHICAGO };
}

/** The pair of files described by hand: header text and 31 bytes, worked from the layout in ISO 11783-10 annex D. */
const HEADER =
  '<TIM A="" D="4"><PTN A="" B="" D=""/><DLV A="008D" B="" C="DET-1"/><DLV A="0039" B="" C="DET-1"/><DLV A="01AB" B="" C="DET-1"/></TIM>';
const RECORD = "e210ec024d3fc7ecbc18c79535c80403000100000001340000000258040000";
const bytesOf = (hex: string) => Uint8Array.from(hex.match(/../g) ?? [], (pair) => parseInt(pair, 16));
const MAIN =
  '<ISO11783_TaskData VersionMajor="4" VersionMinor="3"><DVC A="DVC-1" B="Larkspur drill"><DET A="DET-1" B="1" C="1" D="Drill" E="0" F="0"/></DVC><TSK A="TSK-1" B="East quarter"><TLG A="TLG00001" C="1"/></TSK></ISO11783_TaskData>';
const small = (binary: Uint8Array, header = HEADER, main = MAIN) =>
  zipOf({ "TASKDATA/TASKDATA.XML": main, "TASKDATA/TLG00001.XML": header, "TASKDATA/TLG00001.BIN": binary });

/** Some of a log's records. */
function recordsOf(log: MachineLog, from: number, to: number): MachineLog {
  const cut = <T extends { slice(from: number, to: number): T }>(values: T | null) => values && values.slice(from, to);
  return {
    ...log,
    records: to - from,
    timeMs: log.timeMs.slice(from, to),
    longitude: log.longitude.slice(from, to),
    latitude: log.latitude.slice(from, to),
    headingDeg: cut(log.headingDeg),
    speedMps: cut(log.speedMps),
    working: cut(log.working),
    loggedPass: cut(log.loggedPass),
    sourceLine: log.sourceLine.slice(from, to),
    channels: log.channels.map((one) => ({ ...one, values: one.values.slice(from * one.rows, to * one.rows) })),
  };
}

const valuesOf = (log: MachineLog, id: string) => [
  ...(log.channels.find((channel) => channel.id === id)?.values ?? []),
];

describe("a time log made by hand", () => {
  it("is read to the last bit", async () => {
    const zip = small(bytesOf(RECORD));
    const { log } = await mustRead(source(zip), await proposed(zip));
    expect(log.records).toBe(1);
    // 13:37:05.250 by a clock at UTC-5.
    expect(new Date(log.timeMs[0] ?? NaN).toISOString()).toBe("2024-05-14T18:37:05.250Z");
    expect([log.latitude[0], log.longitude[0]]).toEqual([41.5034567, -93.6012345]);
    expect(log.working?.[0]).toBe(1);
    expect(valuesOf(log, "depth")).toEqual([Math.fround(0.052)]);
    expect(valuesOf(log, "downforce")).toEqual([1112]);
    expect(valuesOf(log, "other:position status")).toEqual([4]);
  });

  it("keeps a value that is not repeated, and has nothing before the first", async () => {
    const bare = bytesOf(`${RECORD.slice(0, 30)}00`);
    const [log] = [
      await mustRead(
        source(small(new Uint8Array([...bare, ...bytesOf(RECORD), ...bare]))),
        await proposed(small(bytesOf(RECORD))),
      ),
    ].map((outcome) => outcome.log);
    expect(log && valuesOf(log, "downforce")).toEqual([NaN, 1112, 1112]);
    expect([...(log?.working ?? [])]).toEqual([0, 1, 1]);
  });

  it("leaves a cut-off last record out with a note, wherever it is cut", async () => {
    const mapping = await proposed(small(bytesOf(RECORD)));
    for (let cut = 1; cut < 31; cut++) {
      const { log, notes } = await mustRead(source(small(bytesOf(RECORD + RECORD.slice(0, cut * 2)))), mapping);
      expect(log.records).toBe(1);
      expect(notes).toContainEqual(expect.objectContaining({ code: "cut-record", firstLine: 2 }));
    }
  });

  it("counts whole records without reading them", () => {
    const header = readTimeLogHeader(new TextEncoder().encode(HEADER), "TLG00001.XML");
    const two = bytesOf(RECORD + RECORD);
    for (let cut = 0; cut <= 62; cut++) {
      const bytes = two.subarray(0, cut);
      expect(countRecords(bytes, header)).toBe(Math.floor(cut / 31));
      expect(scanTimeLog(bytes, header, () => undefined).records).toBe(Math.floor(cut / 31));
    }
  });

  it("reads the parts of the position in the order of the header", async () => {
    const header = HEADER.replace('A="" B="" D=""', 'A="" B="" C="" D="" E="" F="" G="" H="" I=""');
    // up 350000 mm, status 4, PDOP 1.5, HDOP 0.9, 12 satellites, UTC 18:37:05.250 on day 16205 (2024-05-14).
    const parts = "3057050004" + "0f00" + "0900" + "0c" + "62b9fe03" + "4d3f";
    const binary = bytesOf(RECORD.slice(0, 28) + parts + RECORD.slice(30));
    const zip = small(binary, header);
    const { log } = await mustRead(source(zip), proposeMapping(await mustInspect(source(zip))).mapping);
    expect(new Date(log.timeMs[0] ?? NaN).toISOString()).toBe("2024-05-14T18:37:05.250Z");
    expect(
      ["altitude", "position status", "PDOP", "HDOP", "satellites"].map((name) => valuesOf(log, `other:${name}`)[0]),
    ).toEqual([350, 4, 1.5, Math.fround(0.9), 12]);
    expect(valuesOf(log, "downforce")).toEqual([1112]);
  });

  it("takes a position without a fix, or at 0,0, for none", async () => {
    const noFix = RECORD.slice(0, 28) + "00" + RECORD.slice(30);
    const nowhere = RECORD.slice(0, 12) + "0".repeat(16) + RECORD.slice(28);
    const zip = small(bytesOf(RECORD + noFix + nowhere));
    const { log, notes } = await mustRead(source(zip), await proposed(zip));
    expect([...log.latitude]).toEqual([41.5034567, NaN, NaN]);
    expect(notes.map(({ code, count, firstLine }) => [code, count, firstLine])).toEqual(
      expect.arrayContaining([
        ["no-fix", 1, 2],
        ["zero-position", 1, 3],
      ]),
    );
  });

  it("says that margin is not in it, that its clock is local, and asks what ground cover is measured in", async () => {
    const header = HEADER.replace("0039", "0226");
    const inspection = await mustInspect(source(small(bytesOf(RECORD), header)));
    const codes = inspection.notes.map(({ code }) => code);
    expect(codes).toEqual(expect.arrayContaining(["no-margin", "local-clock", "unknown-unit"]));
    expect(inspection.columns.some(({ proposal }) => proposal?.channel === "margin")).toBe(false);
    expect(inspection.columns.find(({ name }) => name.startsWith("ground cover"))?.proposal).toMatchObject({
      unit: null,
    });
  });

  it("reads condensed work states, two bits a section from the lowest", async () => {
    const sections = [1, 2, 3, 4].map((n) => `<DET A="DET-${n + 1}" B="${n + 1}" C="4" E="${n}" F="1"/>`).join("");
    const main = MAIN.replace('F="0"/>', `F="0"/>${sections}`);
    const header = HEADER.replace("008D", "00A1").replace("0039", "0038");
    // on, off, error, not there: 01 | 00 << 2 | 10 << 4 | 11 << 6 = 225.
    const zip = small(bytesOf(RECORD.replace("0001000000", "00e1000000")), header, main);
    const inspection = await mustInspect(source(zip));
    const states = inspection.columns.filter(({ name }) => name.startsWith("section state"));
    expect(states.map(({ sample, proposal }) => [sample[0] ?? "", proposal?.channel, proposal?.row])).toEqual([
      ["1", "working", 1],
      ["0", "working", 2],
      ["", "working", 3],
      ["", "working", 4],
    ]);
  });
});

describe("resolutions of the ISO 11783-11 dictionary", () => {
  // Raw values and what they are: worked by hand from the resolutions of ISO 11783-11 as isoxml 1.11.2 lists them.
  it.each([
    ["000C", 8402, "population", 8.402],
    ["0039", 52, "depth", 0.052],
    ["0063", 155_000, "moisture", 0.155],
    ["0054", 962_618, "yieldMass", 0.962618],
    ["01AB", 1112, "downforce", 1112],
    ["0043", 9144, "swathWidth", 9.144],
    ["0057", 7_250_000, "yieldFlow", 7.25],
  ])("%s: %d is %s %d in SI", async (ddi, raw, channel, valueSi) => {
    const binary = bytesOf(RECORD.slice(0, 30) + "0100" + "00000000");
    new DataView(binary.buffer).setInt32(17, raw, true);
    const header = `<TIM A="" D="4"><PTN A="" B="" D=""/><DLV A="${ddi}" B="" C="DET-1"/></TIM>`;
    const zip = small(binary, header);
    const { log } = await mustRead(source(zip), await proposed(zip));
    expect(valuesOf(log, channel)[0]).toBeCloseTo(valueSi, 6);
  });

  it("keeps a downforce pressure a pressure", async () => {
    const zip = small(bytesOf(RECORD), HEADER.replace("01AB", "016E"));
    const { log, notes } = await mustRead(source(zip), await proposed(zip));
    expect(log.channels.find(({ id }) => id === "downforce")?.unit).toBe("Pa");
    expect(notes.map(({ code }) => code)).toContain("pressure-not-force");
  });

  it("follows the dictionary where the device's own scale does not fit it, and says so", async () => {
    const described =
      '<DOR A="5"/></DET><DPD A="5" B="0039" C="1" D="8" E="Depth" F="6"/><DVP A="6" B="0" C="1" D="0" E="cm"/>';
    const zip = small(bytesOf(RECORD), HEADER, MAIN.replace('F="0"/>', `F="0">${described}`));
    expect((await mustInspect(source(zip))).notes.map(({ code }) => code)).toContain("presentation-disagrees");
    expect(valuesOf((await mustRead(source(zip), await proposed(zip))).log, "depth")[0]).toBeCloseTo(0.052, 7);
  });

  it("reads a maker's own identifier by its device's offset, scale and unit, and leaves it to a person", async () => {
    const described =
      '<DOR A="5"/></DET><DPD A="5" B="E100" C="1" D="8" E="Gauge wheel load" F="6"/><DVP A="6" B="-100" C="0.5" D="0" E="N"/>';
    const zip = small(bytesOf(RECORD), HEADER.replace("01AB", "E100"), MAIN.replace('F="0"/>', `F="0">${described}`));
    const column = (await mustInspect(source(zip))).columns.find(({ name }) => name.startsWith("Gauge wheel load"));
    // (1112 - 100) * 0.5
    expect(column?.sample).toEqual(["506"]);
    expect(column?.proposal).toMatchObject({ channel: "margin", unit: "N" });
    expect(column?.proposal?.confidence).toBeLessThan(0.7);
  });
});

describe("a simulated log as task data", () => {
  it("comes back within the format's own rounding, every row in its place", async () => {
    // The description lists the rows in another order than they stand.
    const zip = written({ rowOrder: [5, 1, 8, 2, 7, 3, 6, 4] });
    const { log, device } = await mustRead(source(zip), await proposed(zip));
    expect(log).toMatchObject({ kind: "seeding", records: simulated.records, rows: simulated.rows });
    for (const [id, tolerance] of [
      ["downforce", 0.501],
      ["depth", 0.000501],
    ] as const) {
      const expected = simulated.channels.find((channel) => channel.id === id)?.values ?? [];
      const worst = valuesOf(log, id).reduce((most, value, at) => {
        const truly = expected[at] ?? NaN;
        expect(Number.isNaN(value)).toBe(Number.isNaN(truly));
        return Number.isNaN(value) ? most : Math.max(most, Math.abs(value - truly));
      }, 0);
      expect(worst).toBeLessThan(tolerance);
    }
    for (let record = 0; record < log.records; record++) {
      expect(Math.abs((log.timeMs[record] ?? 0) - (simulated.timeMs[record] ?? 0))).toBeLessThan(1);
      expect(Math.abs((log.latitude[record] ?? 0) - (simulated.latitude[record] ?? 0))).toBeLessThan(5.1e-8);
    }
    expect([...(log.working ?? [])]).toEqual([...(simulated.working ?? [])]);
    expect(device?.rowOffsetsM).toEqual([...layout.offsetM]);
    expect(device?.rowWidthsM).toEqual(Array.from({ length: 8 }, () => 0.25));
  });

  it("does not care for the letter case of its files", async () => {
    const zip = written({ letterCase: "lower" });
    expect((await mustRead(source(zip), await proposed(zip))).log.records).toBe(simulated.records);
  });

  it("waits for a choice when there are several tasks", async () => {
    const short = { ...simulated, records: 40 };
    const zip = writeTaskDataZip(
      [
        { designator: "West", log: short },
        { designator: "East", log: simulated },
      ],
      GEOMETRY,
    );
    const inspection = await mustInspect(source(zip));
    expect(inspection.layers?.map(({ id, label, records }) => [id, label, records])).toEqual([
      ["TSK-2/TLG00002", "East, TLG00002", simulated.records],
      ["TSK-1/TLG00001", "West, TLG00001", 40],
    ]);
    expect(inspection.notes[0]?.code).toBe("several-layers");
    const mapping = { ...proposeMapping(inspection).mapping, ...CHICAGO };
    expect((await errorOf(source(zip), mapping))?.code).toBe("several-layers");
    expect((await errorOf(source(zip), { ...mapping, layer: "TSK-9/TLG00001" }))?.code).toBe("unknown-layer");
    expect((await mustRead(source(zip), { ...mapping, layer: "TSK-1/TLG00001" })).log.records).toBe(40);
  });

  it("of one task in several time logs is offered whole, and read as the uncut log", async () => {
    const cut = 100;
    const tasks = writeTaskDataZip(
      [
        { designator: "East", log: recordsOf(simulated, cut, simulated.records) },
        { designator: "East", log: recordsOf(simulated, 0, cut) },
        { designator: "West", log: recordsOf(simulated, 0, 40) },
      ],
      GEOMETRY,
    );
    // As a controller that was switched off and on writes it: the second time log under the first task.
    const files = unzipSync(tasks);
    const main = Object.keys(files).find((name) => /taskdata\.xml$/i.test(name)) ?? "";
    const xml = new TextDecoder().decode(files[main]);
    const [, moved = ""] = /(<TLG\b[^>]*TLG00002[^>]*\/>)/.exec(xml) ?? [];
    const joined = xml.replace(moved, "").replace(/(<TLG\b[^>]*TLG00001[^>]*\/>)/, `$1${moved}`);
    const zip = zipSync({ ...files, [main]: new TextEncoder().encode(joined) });
    const inspection = await mustInspect(source(zip));
    expect(inspection.layers?.map(({ id, label, records }) => [id, label, records])).toEqual([
      ["TSK-1/*", "All of East, 2 time logs", simulated.records],
      ["TSK-1/TLG00001", "East, TLG00001", simulated.records - cut],
      ["TSK-1/TLG00002", "East, TLG00002", cut],
      ["TSK-3/TLG00003", "West, TLG00003", 40],
    ]);
    expect(inspection.notes[0]).toMatchObject({ code: "several-layers", count: 3 });
    const mapping = { ...proposeMapping(inspection).mapping, ...CHICAGO };
    const whole = await mustRead(source(zip), { ...mapping, layer: "TSK-1/*" });
    const once = await mustRead(source(written()), { ...mapping, layer: undefined });
    expect(whole.log.timeMs).toEqual(once.log.timeMs);
    expect(whole.log.channels.map(({ id, values }) => [id, [...values]])).toEqual(
      once.log.channels.map(({ id, values }) => [id, [...values]]),
    );
    expect(whole.device).toEqual(once.device);
    expect(whole.notes.map(({ code }) => code)).toContain("parts-joined");
    expect((await errorOf(source(zip), { ...mapping, layer: "TSK-3/*" }))?.code).toBe("unknown-layer");
  });

  it("holds the same records for a second reader", async () => {
    const zip = written();
    const manager = new ISOXMLManager();
    await manager.parseISOXMLFile(zip, "application/zip");
    const task = manager.rootElement.attributes.Task?.[0] as Task;
    const { timeLogs } = (task.attributes.TimeLog?.[0] as ExtendedTimeLog).parseBinaryFile();
    const filled = (task.attributes.TimeLog?.[0] as ExtendedTimeLog).getFilledTimeLogs();
    const { log } = await mustRead(source(zip), await proposed(zip));
    expect(timeLogs).toHaveLength(log.records);
    const downforce = log.channels.find((channel) => channel.id === "downforce");
    for (let record = 0; record < log.records; record++) {
      expect(filled[record]?.position?.PositionNorth ?? NaN).toBe(log.latitude[record]);
      for (let row = 1; row <= log.rows; row++) {
        const raw = filled[record]?.values[`01AB_DET${row + 2}`] ?? filled[record]?.values[`01AB_DET-${row + 2}`];
        const ours = downforce?.values[record * log.rows + row - 1] ?? NaN;
        expect(Number.isNaN(ours) ? -2_147_483_648 : ours).toBe(raw);
      }
    }
  });

  it("offers a load on the gauge wheel only under the maker's own words", async () => {
    const inspection = await mustInspect(source(written({ withMargin: true })));
    const margins = inspection.columns.filter(({ proposal }) => proposal?.channel === "margin");
    expect(margins.map(({ proposal }) => proposal?.row)).toEqual([1, 2, 3, 4, 5, 6, 7, 8]);
    expect(Math.max(...margins.map(({ proposal }) => proposal?.confidence ?? 1))).toBeLessThan(0.7);
  });
});

describe("damaged task data", () => {
  const good = small(bytesOf(RECORD));

  it.each([
    ["task-data-damaged", small(bytesOf(RECORD), HEADER, MAIN.slice(0, 90))],
    ["task-data-damaged", small(bytesOf(RECORD), "<TIM")],
    ["task-data-damaged", small(bytesOf(RECORD), "<XYZ/>")],
    ["missing-position", small(bytesOf(RECORD), '<TIM A="" D="4"><DLV A="008D" B="" C="DET-1"/></TIM>')],
    ["no-readings", small(new Uint8Array(0))],
    ["no-readings", zipOf({ "TASKDATA.XML": MAIN })],
    ["latitude-out-of-range", small(bytesOf(RECORD.replace("c7ecbc18", "ffffff7f")))],
  ])("ends in %s", async (code, bytes) => {
    expect(
      (await errorOf(source(bytes), code === "latitude-out-of-range" ? await proposed(good) : undefined))?.code,
    ).toBe(code);
  });

  it("never throws, whatever bytes of its parts are changed or cut", async () => {
    const parts = unzipSync(good);
    const mapping = await proposed(good);
    for (let round = 0; round < 400; round++) {
      const damaged = Object.fromEntries(
        Object.entries(parts).map(([name, bytes]) => {
          const copy = bytes.slice(0, round % 3 === 0 ? (round * 7919) % (bytes.length + 1) : bytes.length);
          for (let flip = 0; flip < 3; flip++) {
            if (copy.length > 0) copy[(round * 104_729 + flip * 7907) % copy.length] = (round * 31 + flip * 101) % 256;
          }
          return [name, copy];
        }),
      );
      const zip = zipOf(damaged);
      for (const outcome of [await inspectLog(source(zip)), await readLog(source(zip), mapping)]) {
        if (!outcome.ok) expect(outcome.error.code, outcome.error.message).not.toBe("unreadable");
      }
    }
  });
});
